/**
 * Draws the same stage with WebGL through three; loaded only where there is a WebGL context. Geometry goes up when it
 * changes; tones (one per item and side) go up as a small texture with every turn, so light and marks are those of the
 * z-buffer.
 */
import {
  BackSide,
  BufferAttribute,
  BufferGeometry,
  DataTexture,
  DoubleSide,
  FrontSide,
  GLSL3,
  Matrix4,
  Mesh,
  OrthographicCamera,
  RawShaderMaterial,
  Scene,
  type Side,
  Vector2,
  Vector4,
  WebGLRenderer,
} from 'three'
import { backBias, layerBias, lineBias } from './bias'
import type { Camera } from './camera'
import { parseHex } from './colour'
import type { LineSet } from './lines'
import type { Renderer } from './renderer'
import { ghostAlpha, hatchPx, type Stage, tonesPerItem } from './stage'
import { lineFragment, lineVertex, panelFragment, panelVertex } from './webgl-shaders'

/** Texels per row of the tone texture. */
const toneColumns = 1024
const finestPixelRatio = 2
/** Drawing order; solid panels, which are opaque, come before all of these. */
const order = { lines: 10, ghostDepth: 1000, ghostFilm: 1001, ghostLines: 1002 }

interface DrawnLines {
  readonly mesh: Mesh<BufferGeometry, RawShaderMaterial>
  set: LineSet
}

export class WebglRenderer implements Renderer {
  readonly mode = 'webgl'
  private readonly renderer: WebGLRenderer
  private readonly scene = new Scene()
  /** Three insists on a camera; the matrices are ours. */
  private readonly noCamera = new OrthographicCamera()
  private readonly shared = {
    clip: { value: new Matrix4() },
    clipBias: { value: 1 },
    viewport: { value: new Vector2(1, 1) },
    hatch: { value: 4 },
    tones: { value: new DataTexture(new Uint8Array(4 * toneColumns), toneColumns, 1) },
  }
  private readonly panels = {
    outside: this.panelMesh(FrontSide, 0),
    inside: this.panelMesh(BackSide, backBias),
    ghostDepth: this.panelMesh(DoubleSide, 0),
    ghostFilm: this.panelMesh(DoubleSide, 0),
  }
  private lines: DrawnLines[] = []
  private drawn = { model: -1, positions: -1, triangles: -1, lines: -1 }

  constructor(
    readonly canvas: HTMLCanvasElement,
    context: WebGL2RenderingContext,
  ) {
    this.renderer = new WebGLRenderer({ canvas, context })
    this.renderer.setClearColor(0, 0)
    const { ghostDepth, ghostFilm } = this.panels
    ghostDepth.renderOrder = order.ghostDepth
    ghostDepth.material.transparent = true
    ghostDepth.material.colorWrite = false
    ghostFilm.renderOrder = order.ghostFilm
    ghostFilm.material.transparent = true
    ghostFilm.material.premultipliedAlpha = true
  }

  private panelMesh(side: Side, bias: number): Mesh<BufferGeometry, RawShaderMaterial> {
    const material = new RawShaderMaterial({
      glslVersion: GLSL3,
      vertexShader: panelVertex,
      fragmentShader: panelFragment,
      side,
      uniforms: {
        ...this.shared,
        sideBias: { value: bias },
        sideTone: { value: side === BackSide ? 1 : 0 },
        film: { value: new Vector4(0, 0, 0, 0) },
      },
    })
    const mesh = new Mesh(new BufferGeometry(), material)
    mesh.frustumCulled = false
    this.scene.add(mesh)
    return mesh
  }

  render(stage: Stage, camera: Camera): boolean {
    this.upload(stage)
    const ratio = Math.min(finestPixelRatio, devicePixelRatio)
    this.renderer.setPixelRatio(ratio)
    this.renderer.setSize(camera.width, camera.height, false)
    const { shared } = this
    shared.clip.value.fromArray(camera.clipMatrix())
    shared.clipBias.value = camera.clipBias
    shared.viewport.value.set(this.canvas.width, this.canvas.height)
    shared.hatch.value = Math.max(1, Math.round(hatchPx * ratio))
    this.paintTones(stage, camera)
    const [r, g, b] = parseHex(stage.theme.ghost)
    this.panels.ghostFilm.material.uniforms.film!.value.set(r / 255, g / 255, b / 255, ghostAlpha)
    for (const { mesh, set } of this.lines) {
      const { uniforms } = mesh.material
      const { style } = set
      const [lr, lg, lb] = style.colour
      uniforms.ink!.value.set(lr / 255, lg / 255, lb / 255, stage.lineAlpha(style, camera, ratio))
      uniforms.lineWidth!.value = Math.max(1, style.width * ratio)
      uniforms.dash!.value = style.dash * ratio
      uniforms.bias!.value = lineBias(style.width, camera.focal)
    }
    this.renderer.render(this.scene, this.noCamera)
    return true
  }

  private upload(stage: Stage): void {
    const { versions } = stage
    const { outside, inside, ghostDepth, ghostFilm } = this.panels
    if (versions.positions !== this.drawn.positions || versions.model !== this.drawn.model) {
      for (const mesh of [outside, ghostDepth]) mesh.geometry.dispose()
      const { vertexItem, layer } = stage.model
      const position = new BufferAttribute(Float32Array.from(stage.positions), 3)
      const item = new BufferAttribute(Float32Array.from(vertexItem), 1)
      const rank = new BufferAttribute(
        Float32Array.from(vertexItem, (i) => layer[i]! * layerBias),
        1,
      )
      const make = (): BufferGeometry =>
        new BufferGeometry().setAttribute('position', position).setAttribute('item', item).setAttribute('rank', rank)
      outside.geometry = make()
      inside.geometry = outside.geometry
      ghostDepth.geometry = make()
      ghostFilm.geometry = ghostDepth.geometry
      this.drawn.triangles = -1
    }
    if (versions.triangles !== this.drawn.triangles) {
      outside.geometry.setIndex(new BufferAttribute(stage.solid, 1))
      ghostDepth.geometry.setIndex(new BufferAttribute(stage.ghost, 1))
      for (const mesh of [outside, inside]) mesh.visible = stage.solid.length > 0
      for (const mesh of [ghostDepth, ghostFilm]) mesh.visible = stage.ghost.length > 0
    }
    if (versions.lines !== this.drawn.lines) this.uploadLines(stage.lines)
    Object.assign(this.drawn, versions)
  }

  /** Sets that are still there keep their geometry. */
  private uploadLines(sets: readonly LineSet[]): void {
    const before = this.lines
    this.lines = sets.map((set) => {
      const known = before.findIndex((l) => l.set === set)
      return known >= 0 ? before.splice(known, 1)[0]! : { set, mesh: this.lineMesh(set) }
    })
    for (const { mesh } of before) {
      this.scene.remove(mesh)
      mesh.geometry.dispose()
      mesh.material.dispose()
    }
    this.lines.forEach(({ mesh, set }, i) => {
      mesh.renderOrder = set.style.depth === 'ghost' ? order.ghostLines : order.lines + i
    })
  }

  private lineMesh(set: LineSet): DrawnLines['mesh'] {
    const geometry = lineGeometry(set.ends)
    const material = new RawShaderMaterial({
      glslVersion: GLSL3,
      vertexShader: lineVertex,
      fragmentShader: lineFragment,
      transparent: true,
      premultipliedAlpha: true,
      depthWrite: false,
      depthTest: set.style.depth !== 'through',
      side: DoubleSide,
      uniforms: {
        ...this.shared,
        ink: { value: new Vector4() },
        lineWidth: { value: 1 },
        dash: { value: 0 },
        bias: { value: 0 },
      },
    })
    const mesh = new Mesh(geometry, material)
    mesh.frustumCulled = false
    this.scene.add(mesh)
    return mesh
  }

  private paintTones(stage: Stage, camera: Camera): void {
    const rows = Math.max(1, Math.ceil((tonesPerItem * stage.model.items.length) / toneColumns))
    if (this.shared.tones.value.image.height !== rows) {
      this.shared.tones.value.dispose()
      this.shared.tones.value = new DataTexture(new Uint8Array(4 * toneColumns * rows), toneColumns, rows)
    }
    const texture = this.shared.tones.value
    stage.tones(camera.rotation, texture.image.data as Uint8Array<ArrayBuffer>)
    texture.needsUpdate = true
  }

  dispose(): void {
    this.uploadLines([])
    for (const mesh of Object.values(this.panels)) {
      mesh.geometry.dispose()
      mesh.material.dispose()
    }
    this.shared.tones.value.dispose()
    this.renderer.dispose()
    // A browser allows only a few contexts at a time.
    this.renderer.forceContextLoss()
    this.canvas.remove()
  }
}

/**
 * Four corners per line, each with both ends; the shader widens them to a strip. (Instances of four corners each would
 * be smaller, but drivers without a GPU draw them many times slower.)
 */
const lineGeometry = (ends: Float64Array): BufferGeometry => {
  const count = ends.length / 6
  const start = new Float32Array(12 * count)
  const end = new Float32Array(12 * count)
  const corner = new Int8Array(8 * count)
  const index = new Uint32Array(6 * count)
  for (let i = 0; i < count; i++) {
    for (let k = 0; k < 4; k++) {
      start.set(ends.subarray(6 * i, 6 * i + 3), 12 * i + 3 * k)
      end.set(ends.subarray(6 * i + 3, 6 * i + 6), 12 * i + 3 * k)
    }
    // Share along the line, side of it.
    corner.set([0, -1, 1, -1, 1, 1, 0, 1], 8 * i)
    index.set(
      [0, 1, 2, 0, 2, 3].map((k) => 4 * i + k),
      6 * i,
    )
  }
  return new BufferGeometry()
    .setAttribute('start', new BufferAttribute(start, 3))
    .setAttribute('end', new BufferAttribute(end, 3))
    .setAttribute('corner', new BufferAttribute(corner, 2))
    .setIndex(new BufferAttribute(index, 1))
}
