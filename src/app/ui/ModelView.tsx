/** The 3D view with its controls: turn, zoom, pull apart, show one face kind alone. */
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
import { counted } from '../words/figures'
import { useApp } from './context'
import { Swatch } from './Swatch'
import { kindsOf } from './scene'

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
}

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
  const [alone, setAlone] = useState<string | null>(null)
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
  useEffect(() => view?.setVisibleItems(props.visible ?? null), [view, props.items, props.visible])
  useEffect(() => view?.setGhost(props.ghost ?? null), [view, props.items, props.ghost])
  useEffect(() => view?.setLit(props.lit ?? null), [view, props.items, props.lit])
  useEffect(() => view?.setSeams(props.seams ?? []), [view, props.items, props.seams])
  useEffect(() => view?.setExplode(apart), [view, props.items, apart])
  const kinds = useMemo(() => kindsOf(props.items), [props.items])
  const shown = kinds.some(({ kind }) => kind === alone) ? alone : null
  useEffect(() => view?.setVisibleKinds(shown === null ? null : new Set([shown])), [view, props.items, shown])
  useEffect(() => {
    if (view && props.look) view.lookAt(props.look.direction, 300)
  }, [view, props.look?.key])

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
        {kinds.length > 1 && (
          <fieldset class="row tight kinds">
            <legend class="unseen">Show one face kind alone</legend>
            <button type="button" class="quiet" aria-pressed={shown === null} onClick={() => setAlone(null)}>
              All
            </button>
            {kinds.map(({ kind, panels }) => (
              <button
                key={kind}
                type="button"
                class="quiet kind"
                aria-pressed={shown === kind}
                aria-label={`Only ${kind} (${counted(panels, 'part')})`}
                onClick={() => setAlone(shown === kind ? null : kind)}
              >
                <Swatch kind={kind} tints={tintsOf(props.items, kind)} />
                {kind}
              </button>
            ))}
          </fieldset>
        )}
      </div>
    </div>
  )
}

const tintsOf = (items: readonly SceneItem[], kind: string): Record<string, string> => {
  const item = items.find((entry) => entry.kind === kind)
  return item ? { [kind]: item.colour } : {}
}
