/** The view that the app sees: one stage, one camera, one picker, and whichever renderer the browser allows. */
import { multiply, normalize, type Vec3 } from '../geometry/vec3'
import { Camera, turnBetween } from './camera'
import { CanvasRenderer } from './canvas-renderer'
import { listen } from './controls'
import { Overlay } from './overlay'
import { Picker } from './pick'
import type { Renderer } from './renderer'
import { Stage } from './stage'
import type { Lit, Pick, Preview, PreviewOptions, PreviewTheme, SceneItem, SceneOptions, SeamLine } from './types'

/** A picture left unsharp for speed is sharpened when nothing has moved for this long. */
const restMs = 140

/** Builds the view inside `host`, which must have a size of its own (CSS) and gets one child. */
export const createPreview = async (host: HTMLElement, options: PreviewOptions): Promise<Preview> => {
  const view = new View(host, options, await firstRenderer(options.mode ?? 'auto'))
  view.resize()
  view.invalidate()
  return view
}

const newCanvas = (): HTMLCanvasElement => {
  const canvas = document.createElement('canvas')
  canvas.style.cssText = 'position:absolute;inset:0;width:100%;height:100%;display:block'
  canvas.setAttribute('aria-hidden', 'true')
  return canvas
}

const firstRenderer = async (mode: NonNullable<PreviewOptions['mode']>): Promise<Renderer> => {
  if (mode !== 'canvas') {
    const canvas = newCanvas()
    // Asked for here, because three throws where there is none.
    const context = canvas.getContext('webgl2', {
      alpha: true,
      antialias: true,
      premultipliedAlpha: true,
      failIfMajorPerformanceCaveat: mode === 'fast',
    })
    if (context && !(mode === 'fast' && isSoftware(context))) {
      try {
        const { WebglRenderer } = await import('./webgl-renderer')
        return new WebglRenderer(canvas, context)
      } catch (error) {
        // The part did not load, or the driver gave up: the picture is the same without it.
        console.warn('WebGL could not be used; drawing without it.', error)
      }
    }
  }
  return new CanvasRenderer(newCanvas())
}

/** Some browsers draw WebGL without a GPU and do not call that slow; the z-buffer is several times faster than that. */
const isSoftware = (context: WebGL2RenderingContext): boolean => {
  const info = context.getExtension('WEBGL_debug_renderer_info')
  const name = String(context.getParameter(info ? info.UNMASKED_RENDERER_WEBGL : context.RENDERER))
  return /swiftshader|llvmpipe|softpipe|software|basic render/i.test(name)
}

class View implements Preview {
  onPick: Preview['onPick'] = () => {}
  readonly element = document.createElement('div')
  private readonly stage = new Stage()
  private readonly camera: Camera
  private readonly picker = new Picker()
  private readonly overlay: Overlay
  private readonly cleanUp: (() => void)[] = []
  private renderer!: Renderer
  private frame = 0
  private rest = 0
  private held = false
  private dirty = true
  private sharp = false
  private disposed = false
  private turning: { from: Camera['rotation']; shift: Camera['shift']; to: Vec3; start: number; ms: number } | null =
    null
  private pointer: { x: number; y: number } | null = null
  private hovered: number | null = null
  private waiting: (() => void)[] = []

  constructor(host: HTMLElement, options: PreviewOptions, renderer: Renderer) {
    const interactive = options.interactive ?? true
    this.camera = new Camera(options.direction)
    const { element } = this
    element.style.cssText =
      'position:relative;width:100%;height:100%;overflow:hidden;user-select:none;-webkit-user-select:none'
    if (interactive) {
      element.tabIndex = 0
      element.style.touchAction = 'none'
      // Arrow keys must reach the view, which "application" tells the screen reader.
      element.setAttribute('role', 'application')
      element.setAttribute('aria-roledescription', '3D view')
      element.setAttribute('aria-keyshortcuts', 'ArrowLeft ArrowRight ArrowUp ArrowDown + - 0 Enter')
    } else element.setAttribute('role', 'img')
    this.setLabel(options.label)
    if (options.theme) this.stage.setTheme(options.theme)
    host.append(element)
    this.overlay = new Overlay(element, interactive)
    this.use(renderer)
    this.cleanUp.push(
      listen(
        element,
        {
          orbit: (right, down, roll) => this.moved(() => this.camera.orbit(right, down, roll)),
          pan: (dx, dy) => this.moved(() => this.camera.pan(dx, dy)),
          zoom: (factor, x, y) => this.moved(() => this.camera.zoomAt(factor, x, y)),
          reset: () => this.resetView(),
          click: (x, y) => this.onPick(this.pickAt(x, y), 'click'),
          clickMiddle: () => this.onPick(this.pickAt(this.camera.width / 2, this.camera.height / 2), 'click'),
          hover: (place) => {
            this.pointer = place
            this.schedule()
          },
          holding: (isHeld) => {
            this.held = isHeld
            if (isHeld) return
            if (!this.sharp) this.invalidate()
            else this.schedule()
          },
        },
        interactive,
      ),
    )
    const focused = (): void => this.schedule()
    element.addEventListener('focus', focused)
    element.addEventListener('blur', focused)
    const watch = new ResizeObserver(() => this.resize())
    watch.observe(host)
    this.cleanUp.push(() => watch.disconnect())
  }

  get mode(): 'webgl' | 'canvas' {
    return this.renderer.mode
  }

  private use(renderer: Renderer): void {
    this.renderer = renderer
    this.element.prepend(renderer.canvas)
    if (renderer.mode !== 'webgl') return
    const lost = (): void => {
      renderer.canvas.removeEventListener('webglcontextlost', lost)
      if (this.disposed) return
      renderer.dispose()
      this.use(new CanvasRenderer(newCanvas()))
      this.invalidate()
    }
    renderer.canvas.addEventListener('webglcontextlost', lost)
  }

  setScene(items: readonly SceneItem[], options?: SceneOptions): void {
    this.stage.setScene(items, options)
    this.hovered = null
    this.invalidate()
  }

  setExplode(fraction: number): void {
    this.moved(() => this.stage.setExplode(fraction))
  }

  setVisibleKinds(kinds: ReadonlySet<string> | null): void {
    this.stage.setVisibleKinds(kinds)
    this.invalidate()
  }

  setVisibleItems(ids: ReadonlySet<number> | null): void {
    this.stage.setVisibleItems(ids)
    this.invalidate()
  }

  setGhost(ids: ReadonlySet<number> | null): void {
    this.stage.setGhost(ids)
    this.invalidate()
  }

  setLit(lit: Lit | readonly Lit[] | null): void {
    this.stage.setLit(lit === null ? [] : Array.isArray(lit) ? (lit as readonly Lit[]) : [lit as Lit])
    this.invalidate()
  }

  setSeams(lines: readonly SeamLine[]): void {
    this.stage.setSeams(lines)
    this.invalidate()
  }

  setTheme(theme: Partial<PreviewTheme>): void {
    this.stage.setTheme(theme)
    this.invalidate()
  }

  setLabel(label: string): void {
    this.element.setAttribute('aria-label', label)
  }

  lookAt(direction: Vec3, animateMs: number): void {
    const still = animateMs <= 0 || matchMedia('(prefers-reduced-motion: reduce)').matches
    this.turning = {
      from: this.camera.rotation,
      shift: this.camera.shift,
      to: normalize(direction),
      start: performance.now(),
      ms: still ? 0 : animateMs,
    }
    if (still) this.turn(performance.now())
    this.invalidate()
  }

  /** One step of the turn that `lookAt` began. */
  private turn(now: number): void {
    const { turning, camera } = this
    if (!turning) return
    const t = turning.ms > 0 ? Math.min(1, Math.max(0, (now - turning.start) / turning.ms)) : 1
    const eased = t * t * (3 - 2 * t)
    const { from, to, shift } = turning
    const seen: Vec3 = [dot3(from[0], to), dot3(from[1], to), dot3(from[2], to)]
    camera.setRotation(multiply(turnBetween(seen, [0, 0, 1], eased), from))
    camera.setShift([shift[0] * (1 - eased), shift[1] * (1 - eased)])
    if (t >= 1) this.turning = null
  }

  resetView(): void {
    this.moved(() => this.camera.reset())
  }

  zoomBy(factor: number): void {
    this.moved(() => this.camera.zoomAt(factor))
  }

  orbitBy(rightDegrees: number, downDegrees: number): void {
    this.moved(() => this.camera.orbit((rightDegrees * Math.PI) / 180, (downDegrees * Math.PI) / 180))
  }

  /** A change that more are likely to follow at once: drawn fast first, sharp when it rests. */
  private moved(change: () => void): void {
    this.turning = null
    change()
    this.rest = performance.now() + restMs
    this.invalidate()
  }

  resize(): void {
    const { clientWidth, clientHeight } = this.element
    const { version } = this.camera
    this.camera.resize(Math.max(1, clientWidth), Math.max(1, clientHeight))
    if (this.camera.version !== version) this.invalidate()
  }

  project(point: Vec3, item?: number): { x: number; y: number } {
    this.update()
    const { x, y } = this.camera.project(this.stage.place(point, item))
    return { x, y }
  }

  pickAt(x: number, y: number): Pick | null {
    this.update()
    if (x < 0 || y < 0 || x > this.camera.width || y > this.camera.height) return null
    const index = this.picker.itemAt(this.stage, this.camera, x, y)
    if (index < 0) return null
    const { id, group } = this.stage.model.items[index]!
    return { item: id, group }
  }

  private update(): void {
    this.stage.update()
    this.camera.setSpread(this.stage.spread)
  }

  /** The picture is out of date. */
  invalidate(): void {
    this.dirty = true
    this.sharp = false
    this.schedule()
  }

  private schedule(): void {
    if (this.frame === 0 && !this.disposed) this.frame = requestAnimationFrame((now) => this.step(now))
  }

  private step(now: number): void {
    this.frame = 0
    if (this.disposed) return
    if (this.dirty) this.draw(now)
    this.overlay.place(this.stage.labels(), (at) => this.camera.project(at))
    this.tellHover()
    if (this.turning) this.invalidate()
    else if (!this.sharp && !this.held) this.sharpenLater()
    if (this.sharp && this.frame === 0) for (const done of this.waiting.splice(0)) done()
  }

  private draw(now: number): void {
    this.dirty = false
    this.turn(now)
    this.update()
    const { camera } = this
    // Hidden or not laid out yet; the size watcher calls again.
    if (camera.width > 1 && camera.height > 1) {
      const moving = this.held || this.turning !== null || performance.now() < this.rest
      this.sharp = this.renderer.render(this.stage, camera, moving) || !moving
    } else this.sharp = true
  }

  private sharpenTimer: ReturnType<typeof setTimeout> | undefined
  private sharpenLater(): void {
    clearTimeout(this.sharpenTimer)
    this.sharpenTimer = setTimeout(() => this.invalidate(), Math.max(0, this.rest - performance.now()) + 1)
  }

  /** Tells the app when something else has come under the pointer, or under the middle mark while keys are in use. */
  private tellHover(): void {
    if (this.held) return
    const place =
      this.pointer ??
      (this.element.matches(':focus-visible') ? { x: this.camera.width / 2, y: this.camera.height / 2 } : null)
    const hit = place ? this.pickAt(place.x, place.y) : null
    if ((hit?.item ?? null) === this.hovered) return
    this.hovered = hit?.item ?? null
    this.onPick(hit, 'hover')
  }

  settled(): Promise<void> {
    if (this.disposed || (this.sharp && this.frame === 0)) return Promise.resolve()
    return new Promise((resolve) => this.waiting.push(resolve))
  }

  dispose(): void {
    if (this.disposed) return
    this.disposed = true
    cancelAnimationFrame(this.frame)
    clearTimeout(this.sharpenTimer)
    for (const clean of this.cleanUp) clean()
    this.renderer.dispose()
    this.element.remove()
    for (const done of this.waiting.splice(0)) done()
  }
}

const dot3 = (a: Vec3, b: Vec3): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
