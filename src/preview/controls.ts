/**
 * Pointer, touch, wheel and keys, turned into plain wishes. Drag or one finger turns; two fingers zoom, shift and roll;
 * Shift, the middle or the right button shift; the wheel zooms at the pointer. Keys: arrows turn, + − zoom, 0 or Home
 * resets, Enter picks at the middle mark.
 */

export interface Wishes {
  /** Radians. */
  orbit(right: number, down: number, roll: number): void
  pan(dx: number, dy: number): void
  zoom(factor: number, x?: number, y?: number): void
  reset(): void
  /** A click or tap at a place of the element. */
  click(x: number, y: number): void
  clickMiddle(): void
  /** The pointer moved over the element (no button down), or left it: null. */
  hover(place: { x: number; y: number } | null): void
  /** A drag or pinch began or ended. */
  holding(isHeld: boolean): void
}

const keyTurn = Math.PI / 30
const keyZoom = 1.25
/** A drag across the smaller side turns the model by this much. */
const turnPerSide = Math.PI
/** CSS px that a click may wander. */
const clickSlack = { mouse: 4, touch: 10 }

interface Held {
  x: number
  y: number
}

/** Listens on `element`; `interactive` false leaves only hovering and clicks. @returns a function that stops listening */
export const listen = (element: HTMLElement, wishes: Wishes, interactive: boolean): (() => void) => {
  const held = new Map<number, Held>()
  let wandered = 0
  let shifting = false
  const stop = new AbortController()
  const { signal } = stop

  const place = (event: MouseEvent): { x: number; y: number } => {
    const box = element.getBoundingClientRect()
    return { x: event.clientX - box.left, y: event.clientY - box.top }
  }

  element.addEventListener(
    'pointerdown',
    (event) => {
      if (held.size === 0) {
        wandered = 0
        shifting = event.shiftKey || event.button > 0
      } else wandered = Number.POSITIVE_INFINITY
      held.set(event.pointerId, place(event))
      if (!interactive) return
      element.setPointerCapture(event.pointerId)
      if (held.size === 1) wishes.holding(true)
    },
    { signal },
  )

  element.addEventListener(
    'pointermove',
    (event) => {
      const now = place(event)
      const before = held.get(event.pointerId)
      if (!before) {
        if (event.pointerType !== 'touch') wishes.hover(now)
        return
      }
      const dx = now.x - before.x
      const dy = now.y - before.y
      wandered += Math.hypot(dx, dy)
      const others = [...held].filter(([id]) => id !== event.pointerId).map(([, p]) => p)
      held.set(event.pointerId, now)
      if (!interactive) return
      const other = others[0]
      if (other) {
        const was = { x: before.x - other.x, y: before.y - other.y }
        const is = { x: now.x - other.x, y: now.y - other.y }
        const ratio = Math.hypot(is.x, is.y) / Math.max(1, Math.hypot(was.x, was.y))
        wishes.zoom(ratio, (now.x + other.x) / 2, (now.y + other.y) / 2)
        wishes.pan(dx / 2, dy / 2)
        const roll = Math.atan2(was.x * is.y - was.y * is.x, was.x * is.x + was.y * is.y)
        wishes.orbit(0, 0, -roll)
      } else if (wandered > slackOf(event)) {
        if (shifting) wishes.pan(dx, dy)
        else {
          const k = turnPerSide / Math.max(1, Math.min(element.clientWidth, element.clientHeight))
          wishes.orbit(dx * k, dy * k, 0)
        }
      }
    },
    { signal },
  )

  const release = (event: PointerEvent, isClick: boolean): void => {
    if (!held.delete(event.pointerId)) return
    if (held.size === 0 && interactive) wishes.holding(false)
    if (isClick && held.size === 0 && event.button === 0 && wandered <= slackOf(event)) {
      const { x, y } = place(event)
      wishes.click(x, y)
    }
  }
  element.addEventListener('pointerup', (event) => release(event, true), { signal })
  element.addEventListener('pointercancel', (event) => release(event, false), { signal })
  element.addEventListener(
    'pointerleave',
    (event) => {
      if (!interactive) held.delete(event.pointerId)
      if (event.pointerType !== 'touch') wishes.hover(null)
    },
    { signal },
  )
  if (!interactive) return () => stop.abort()

  element.addEventListener('contextmenu', (event) => event.preventDefault(), { signal })
  element.addEventListener(
    'wheel',
    (event) => {
      event.preventDefault()
      // Lines and pages (other delta modes) as about 16 and 400 px.
      const px = event.deltaY * ([1, 16, 400][event.deltaMode] ?? 1)
      const { x, y } = place(event)
      wishes.zoom(Math.exp(-Math.max(-240, Math.min(240, px)) * (event.ctrlKey ? 0.01 : 0.0018)), x, y)
    },
    { signal, passive: false },
  )
  const keys: Record<string, () => void> = {
    ArrowLeft: () => wishes.orbit(-keyTurn, 0, 0),
    ArrowRight: () => wishes.orbit(keyTurn, 0, 0),
    ArrowUp: () => wishes.orbit(0, -keyTurn, 0),
    ArrowDown: () => wishes.orbit(0, keyTurn, 0),
    '+': () => wishes.zoom(keyZoom),
    '=': () => wishes.zoom(keyZoom),
    '-': () => wishes.zoom(1 / keyZoom),
    _: () => wishes.zoom(1 / keyZoom),
    '0': () => wishes.reset(),
    Home: () => wishes.reset(),
    Enter: () => wishes.clickMiddle(),
  }
  element.addEventListener(
    'keydown',
    (event) => {
      if (event.ctrlKey || event.metaKey || event.altKey) return
      const action = keys[event.key]
      if (!action) return
      event.preventDefault()
      action()
    },
    { signal },
  )
  return () => stop.abort()
}

const slackOf = (event: PointerEvent): number => (event.pointerType === 'touch' ? clickSlack.touch : clickSlack.mouse)
