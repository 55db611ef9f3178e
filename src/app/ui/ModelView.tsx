/** The 3D view with its controls: turn, zoom, pull apart, show a part alone. */
import { useEffect, useMemo, useRef, useState } from 'preact/hooks'
import {
  createPreview,
  type Lit,
  type Pick,
  type Preview,
  type PreviewTheme,
  type SceneItem,
  type SceneOptions,
  type SeamLine,
} from '../../preview'
import { useApp } from './context'
import { ShowAlone } from './ShowAlone'
import { type Show, showAll, shownItems, type Whole } from './show'

export interface ModelViewProps {
  /** Accessible name. */
  readonly label: string
  readonly items: readonly SceneItem[]
  readonly options?: SceneOptions
  readonly lit?: Lit | readonly Lit[] | null
  readonly seams?: readonly SeamLine[]
  readonly visible?: ReadonlySet<number> | null
  readonly ghost?: ReadonlySet<number> | null
  readonly onPick?: (hit: Pick | null, event: 'hover' | 'click') => void
  /** The view turns so that this direction faces the viewer whenever `key` changes. */
  readonly look?: { readonly direction: readonly [number, number, number]; readonly key: string } | null
  /** Pull apart panels or whole pieces. */
  readonly apart?: 'panels' | 'pieces'
  readonly view?: { current: Preview | null }
  /** The solid that the items are of, so that orbits and vertices can be shown alone too; face kinds always can. */
  readonly whole?: Whole | null
  /** What is shown alone, whenever that changes. */
  readonly onShow?: (show: Show) => void
}

const both = (a: ReadonlySet<number> | null, b: ReadonlySet<number> | null): ReadonlySet<number> | null =>
  a === null ? b : b === null ? a : new Set([...a].filter((id) => b.has(id)))

const themeNow = (): PreviewTheme => {
  const style = getComputedStyle(document.documentElement)
  const read = (name: string): string => style.getPropertyValue(name).trim()
  return {
    edge: read('--view-edge'),
    accent: read('--view-accent'),
    casing: read('--view-casing'),
    ghost: read('--view-ghost'),
  }
}

export const ModelView = (props: ModelViewProps) => {
  const { prefs } = useApp()
  const host = useRef<HTMLDivElement>(null)
  const [view, setView] = useState<Preview | null>(null)
  const [apart, setApart] = useState(0)
  const [wanted, setWanted] = useState<Show>(showAll)
  const mode = prefs.view.value
  const dark = prefs.isDark.value
  const pick = useRef(props.onPick)
  pick.current = props.onPick

  useEffect(() => {
    let gone = false
    let made: Preview | null = null
    const asked = mode === 'plain' ? 'canvas' : mode === 'webgl' ? 'auto' : 'fast'
    void createPreview(host.current!, { label: props.label, theme: themeNow(), mode: asked }).then((fresh) => {
      if (gone) return fresh.dispose()
      made = fresh
      fresh.onPick = (hit, event) => pick.current?.(hit, event)
      setView(fresh)
    })
    return () => {
      gone = true
      made?.dispose()
      setView(null)
    }
  }, [mode])

  if (props.view) props.view.current = view
  const by = props.apart === 'pieces' ? 'groups' : 'items'
  useEffect(() => view?.setScene(props.items, { explodeBy: by, ...props.options }), [view, props.items, by])
  useEffect(() => view?.setTheme(themeNow()), [view, dark])
  useEffect(() => view?.setLabel(props.label), [view, props.label])
  const { items } = props
  const whole = props.whole ?? null
  const show = standing(wanted, items, whole)
  const only = useMemo(() => shownItems(show, items, whole), [show, items, whole])
  const visible = useMemo(() => both(only, props.visible ?? null), [only, props.visible])
  const ghost = useMemo(() => props.ghost && both(props.ghost, only), [only, props.ghost])
  useEffect(() => view?.setVisibleItems(visible), [view, items, visible])
  useEffect(() => view?.setGhost(ghost ?? null), [view, items, ghost])
  useEffect(() => view?.setLit(props.lit ?? null), [view, props.items, props.lit])
  useEffect(() => view?.setSeams(props.seams ?? []), [view, props.items, props.seams])
  useEffect(() => view?.setExplode(apart), [view, props.items, apart])
  useEffect(() => {
    if (view && props.look) view.lookAt(props.look.direction, 300)
  }, [view, props.look?.key])
  const vertex = show.what === 'vertex' ? (whole?.parts.vertices[show.vertex] ?? null) : null
  useEffect(() => {
    if (view && vertex && Math.hypot(...vertex) > 0) view.lookAt(vertex, 300)
  }, [view, vertex])
  const { onShow } = props
  useEffect(() => onShow?.(show), [show])

  return (
    <div class="model-view">
      <div class="model-host" ref={host} data-testid="model" data-mode={view?.mode} />
      <div class="model-controls">
        <label class="apart">
          <span>Pull apart</span>
          <input
            type="range"
            min="0"
            max="1"
            step="0.02"
            value={apart}
            aria-valuetext={apart === 0 ? 'closed' : `${Math.round(apart * 100)} %`}
            onInput={(event) => setApart(Number(event.currentTarget.value))}
          />
        </label>
        <div class="row tight">
          <button type="button" class="quiet square" aria-label="Zoom out" onClick={() => view?.zoomBy(1 / 1.25)}>
            −
          </button>
          <button type="button" class="quiet square" aria-label="Zoom in" onClick={() => view?.zoomBy(1.25)}>
            +
          </button>
          <button type="button" class="quiet" onClick={() => view?.resetView()}>
            Reset<span class="unseen"> the view</span>
          </button>
        </div>
        <ShowAlone items={items} whole={whole} show={show} onShow={setWanted} />
      </div>
    </div>
  )
}

/** What was asked for, as far as this model has it. */
const standing = (asked: Show, items: readonly SceneItem[], whole: Whole | null): Show => {
  if (asked.what === 'kind') return items.some(({ kind }) => kind === asked.kind) ? asked : showAll
  if (asked.what === 'vertex') return whole && asked.vertex < whole.parts.vertices.length ? asked : showAll
  return asked
}
