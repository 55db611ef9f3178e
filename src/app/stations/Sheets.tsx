import { useSignal } from '@preact/signals'
import { useEffect, useMemo, useRef } from 'preact/hooks'
import type { Lit, Pick } from '../../preview'
import type { PageSummary } from '../../worker'
import { papers } from '../state/choices'
import type { Planned } from '../state/workshop'
import { fileNameOf } from '../storage/file'
import { nameOfBuild, savePlanFile } from '../ui/actions'
import { Cautions } from '../ui/Cautions'
import { nothingPointed, useApp } from '../ui/context'
import { download } from '../ui/download'
import { Legend } from '../ui/Legend'
import { lightPiece, pieceAt } from '../ui/lit-page'
import { ModelView } from '../ui/ModelView'
import { type Pages, usePageInto, usePages } from '../ui/pages'
import { usePlansToPrint } from '../ui/plans-to-print'
import { problemsOn } from '../ui/problems'
import { pieceByPanel, planItems } from '../ui/scene'
import { vantage } from '../ui/vantage'
import { counted, listed, mmText } from '../words/figures'

/** Steps of the page's zoom; 1 shows the whole page. */
const zooms = [1, 1.5, 2, 3, 4, 6]
/** CSS pixels per mm by definition (96 to the inch). */
const pxPerMm = 96 / 25.4
/** The pointer rests this long on a panel before its page is turned to, ms. */
const dwell = 450

const Thumb = ({
  pages,
  index,
  page,
  current,
  onGo,
}: {
  pages: Pages
  index: number
  page: PageSummary
  current: boolean
  onGo: () => void
}) => {
  const ref = useRef<HTMLButtonElement>(null)
  const url = useSignal<string | null>(null)
  const { pointed } = useApp()
  const { piece } = pointed.value
  const holds = piece !== null && page.pieces.includes(piece)
  useEffect(() => {
    const watch = new IntersectionObserver(
      (entries) => {
        if (!entries.some(({ isIntersecting }) => isIntersecting)) return
        watch.disconnect()
        void pages
          .image(index)
          .then((address) => {
            url.value = address
          })
          .catch(() => {
            // Told by `pages.error`.
          })
      },
      { rootMargin: '300px' },
    )
    watch.observe(ref.current!)
    return () => watch.disconnect()
  }, [pages])
  useEffect(() => {
    if (current) ref.current?.scrollIntoView({ block: 'nearest', inline: 'nearest' })
  }, [current])
  return (
    <li>
      <button
        ref={ref}
        type="button"
        class={`thumb ${holds ? 'holds' : ''}`}
        aria-current={current ? 'page' : undefined}
        aria-label={`Page ${index + 1}: ${page.title}${page.pieces.length > 0 ? `, ${counted(page.pieces.length, 'piece')}` : ''}`}
        onClick={onGo}
      >
        <span class="paper" style={{ aspectRatio: `${page.widthMm} / ${page.heightMm}` }}>
          {url.value && <img src={url.value} alt="" loading="lazy" />}
        </span>
        <span class="figures">{index + 1}</span>
      </button>
    </li>
  )
}

const Page = ({
  pages,
  index,
  planned,
  onTurn,
}: {
  pages: Pages
  index: number
  planned: Planned
  onTurn: (by: number) => void
}) => {
  const { pointed, announce } = useApp()
  const frame = useRef<HTMLElement>(null)
  const host = useRef<HTMLDivElement>(null)
  const zoom = useSignal(1)
  const page = pages.list.value[index]
  const light = (): void => lightPiece(host.current, pointed.peek().piece)
  usePageInto(host, pages, index, () => {
    const svg = host.current?.querySelector('svg')
    if (svg && page) svg.insertAdjacentHTML('beforeend', problemsOn(planned.plan, page.pieces, page.heightMm).marks)
    light()
  })
  const { piece } = pointed.value
  useEffect(light, [piece])

  const point = (id: number | null): void => {
    if (id === pointed.peek().piece && pointed.peek().panel === null) return
    pointed.value = id === null ? nothingPointed : { piece: id, panel: null }
    const found = planned.plan.pieces.find((entry) => entry.id === id)
    if (found) announce(`Piece ${found.label} is lit on the sheet and on the model.`)
  }
  const setZoom = (by: number): void => {
    const at = zooms.findIndex((each) => each >= zoom.peek())
    zoom.value = zooms[Math.min(zooms.length - 1, Math.max(0, at + by))]!
  }
  const real = (): void => {
    const box = frame.current!
    const fit = Math.min(box.clientWidth / page!.widthMm, box.clientHeight / page!.heightMm)
    zoom.value = pxPerMm / fit
  }
  const keys: Record<string, () => void> = {
    ArrowLeft: () => onTurn(-1),
    PageUp: () => onTurn(-1),
    ArrowRight: () => onTurn(1),
    PageDown: () => onTurn(1),
    Home: () => onTurn(Number.NEGATIVE_INFINITY),
    End: () => onTurn(Number.POSITIVE_INFINITY),
    '+': () => setZoom(1),
    '=': () => setZoom(1),
    '-': () => setZoom(-1),
    '0': () => {
      zoom.value = 1
    },
  }
  const holdPiece = (event: PointerEvent): void => {
    // A finger lights by tapping; a mouse by passing over.
    if (event.pointerType !== 'touch' || event.type === 'pointerdown') point(pieceAt(event.target))
  }
  return (
    <section class="page-area" aria-label="Page">
      <div class="row page-bar">
        <button type="button" class="quiet" disabled={index === 0} onClick={() => onTurn(-1)}>
          Back
        </button>
        <span class="figures grow middle" role="status">
          Page {index + 1} of {pages.list.value.length}
          {page && <span class="soft">: {page.title}</span>}
        </span>
        <button type="button" class="quiet" disabled={index >= pages.list.value.length - 1} onClick={() => onTurn(1)}>
          Next
        </button>
        <span class="row tight">
          <button type="button" class="quiet square" aria-label="Smaller" onClick={() => setZoom(-1)}>
            −
          </button>
          <button type="button" class="quiet square" aria-label="Larger" onClick={() => setZoom(1)}>
            +
          </button>
          <button
            type="button"
            class="quiet"
            onClick={() => {
              zoom.value = 1
            }}
          >
            All of it
          </button>
          <button type="button" class="quiet" onClick={real}>
            True size
          </button>
        </span>
      </div>
      <section
        class="page-frame"
        ref={frame}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: it scrolls, and takes the keys for paging and zoom
        tabIndex={0}
        aria-label={`Page ${index + 1}: arrows turn pages, plus and minus zoom`}
        onKeyDown={(event) => {
          if (event.ctrlKey || event.metaKey || event.altKey) return
          // A magnified page is scrolled by the arrows first.
          const action = keys[event.key]
          if (!action || (zoom.peek() > 1 && event.key.startsWith('Arrow'))) return
          event.preventDefault()
          action()
        }}
      >
        <div
          class="paper large"
          ref={host}
          data-testid="page"
          style={{
            '--zoom': String(zoom.value),
            '--ratio': page ? String(page.widthMm / page.heightMm) : '0.707',
            aspectRatio: page ? `${page.widthMm} / ${page.heightMm}` : '210 / 297',
          }}
          onPointerMove={holdPiece}
          onPointerDown={holdPiece}
          onPointerLeave={(event) => event.pointerType !== 'touch' && point(null)}
        />
      </section>
    </section>
  )
}

/** Pieces of the page as buttons: the way for keyboard and screen reader to do what the pointer does. */
const PiecesHere = ({ page, planned }: { page: PageSummary | undefined; planned: Planned }) => {
  const { pointed, router } = useApp()
  const here = useMemo(
    () => planned.plan.pieces.filter(({ id }) => page?.pieces.includes(id)).sort((a, b) => a.step - b.step),
    [page, planned],
  )
  if (here.length === 0) return null
  const light = (piece: number | null): void => {
    pointed.value = piece === null ? nothingPointed : { piece, panel: null }
  }
  return (
    <section aria-label="Pieces on this page">
      <h2>Pieces on this page</h2>
      <ul class="row tight piece-list">
        {here.map(({ id, label, step, colour }) => (
          <li key={id}>
            <button
              type="button"
              class="chip figures"
              aria-pressed={pointed.value.piece === id}
              title={colour}
              onPointerEnter={() => light(id)}
              onFocus={() => light(id)}
              onClick={() => light(id)}
              onDblClick={() => router.go('bench', step)}
            >
              {label}
            </button>
          </li>
        ))}
      </ul>
    </section>
  )
}

/** What is marked on the page, in words. */
const ProblemsHere = ({ page, planned }: { page: PageSummary | undefined; planned: Planned }) => {
  const here = useMemo(() => (page ? problemsOn(planned.plan, page.pieces, page.heightMm) : null), [page, planned])
  if (!here || here.marks === '') return null
  return (
    <section aria-label="Marked on this page" class="so">
      {here.bare.length > 0 && (
        <p>
          <b>Marked by a dotted line:</b> no room for a tab, glue edge to edge: {listed(here.bare)}.
        </p>
      )}
      {here.narrow && (
        <p>
          <b>Marked by a box:</b> the narrowest panel, {mmText(planned.plan.docket.tightest.widthMm)}.
        </p>
      )}
      <p>These marks do not print.</p>
    </section>
  )
}

const Corner = ({
  pages,
  planned,
  index,
  onGo,
}: {
  pages: Pages
  planned: Planned
  index: number
  onGo: (page: number) => void
}) => {
  const { workshop, pointed, announce } = useApp()
  const { plan } = planned
  const tints = workshop.tints.value
  const items = useMemo(() => planItems(plan, tints), [plan, tints])
  const pieceOf = useMemo(() => pieceByPanel(plan), [plan])
  const { piece, panel } = pointed.value
  const label = plan.pieces.find(({ id }) => id === piece)?.label
  const lit = useMemo((): Lit | null => {
    if (piece === null) return panel === null ? null : { items: new Set([panel]) }
    return { groups: new Set([piece]), ...(label ? { label: `piece ${label}` } : {}) }
  }, [piece, panel, label])
  // Turns only for what was pointed at elsewhere: under the pointer the model stands still.
  const look = useMemo(() => {
    if (piece === null || panel !== null) return null
    return { direction: vantage(plan, piece, new Set(pieceOf.keys())), key: `${piece}` }
  }, [piece, panel, plan])
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined)
  useEffect(() => () => clearTimeout(timer.current), [])
  const onPick = (hit: Pick | null, event: 'hover' | 'click'): void => {
    clearTimeout(timer.current)
    if (!hit) {
      pointed.value = nothingPointed
      return
    }
    const id = pieceOf.get(hit.item) ?? null
    pointed.value = { piece: id, panel: hit.item }
    if (id === null) return
    const page = pages.pageOf(id)
    const turn = (): void => {
      if (page >= 0 && page !== index) onGo(page)
      announce(`Piece ${plan.pieces.find((entry) => entry.id === id)?.label}, page ${page + 1}.`)
    }
    if (event === 'click') turn()
    else timer.current = setTimeout(turn, dwell)
  }
  return (
    <ModelView
      label={`The ${plan.model.name}: point at a panel to see its piece on the sheet`}
      items={items}
      lit={lit}
      look={look}
      apart="pieces"
      onPick={onPick}
    />
  )
}

const Download = ({ planned }: { planned: Planned }) => {
  const app = useApp()
  const { workshop, press, trouble, announce } = app
  const busy = useSignal(false)
  const failed = planned.plan.docket.checks.filter(({ ok }) => !ok)
  const isOld = planned.key === workshop.planned.value?.key && !workshop.isFresh.value
  const writePdf = async (): Promise<void> => {
    busy.value = true
    announce('Writing the PDF.')
    const answer = await press.pdf(planned.plan, planned.choices)
    busy.value = false
    if (!answer.ok) {
      trouble.value = `The PDF could not be written: ${answer.refusal.message}`
      return
    }
    download(`${fileNameOf(nameOfBuild(app))}-sheets.pdf`, answer.value as Uint8Array<ArrayBuffer>, 'application/pdf')
    announce('The PDF is in your downloads.')
  }
  return (
    <section class="download" aria-label="Download">
      <h2>Print</h2>
      {isOld && <p class="stale">These sheets are as of the earlier choices.</p>}
      {failed.length > 0 && (
        <p class="stale" role="alert">
          {counted(failed.length, 'check')} of the plan failed ({failed.map(({ name }) => name).join(', ')}). See the
          docket before you print.
        </p>
      )}
      <div class="row">
        <button type="button" class="primary" disabled={busy.value} onClick={() => void writePdf()}>
          {busy.value ? 'Writing' : 'Download PDF'}
        </button>
        <button type="button" onClick={() => void savePlanFile(app, planned)}>
          Save plan.json
        </button>
      </div>
      <p class="so">
        {papers[planned.choices.paper].name}, print at 100 % (actual size), printed {planned.choices.side}. Measure the
        bar of 100 mm in both directions on the first sheet before you cut.
      </p>
      <Legend />
      <details>
        <summary>Cautions: blades, glue, small parts</summary>
        <Cautions />
      </details>
    </section>
  )
}

const Laid = ({ planned }: { planned: Planned }) => {
  const { router, workshop } = useApp()
  const pages = usePages(planned)!
  const count = pages.list.value.length
  const asked = router.place.value.at
  const index = Math.min(Math.max(asked, 1), Math.max(count, 1)) - 1
  const go = (page: number): void => router.refine(Math.min(Math.max(page, 0), count - 1) + 1)
  useEffect(() => {
    if (count > 0 && asked > count) go(count - 1)
  }, [count, asked])
  if (pages.error.value !== null && count === 0) return <p role="alert">{pages.error.value}</p>
  return (
    <div class="sheets">
      <nav class="strip" aria-label="Pages">
        <ol>
          {pages.list.value.map((page, i) => (
            <Thumb
              key={`${planned.key} ${i}`}
              pages={pages}
              index={i}
              page={page}
              current={i === index}
              onGo={() => go(i)}
            />
          ))}
        </ol>
      </nav>
      <Page key={planned.key} pages={pages} index={index} planned={planned} onTurn={(by) => go(index + by)} />
      <div class="sheets-side">
        <section aria-label="Model" class="corner">
          <Corner pages={pages} planned={planned} index={index} onGo={go} />
        </section>
        <PiecesHere page={pages.list.value[index]} planned={planned} />
        <ProblemsHere page={pages.list.value[index]} planned={planned} />
        <Download planned={planned} />
        <button
          type="button"
          class="wide"
          onClick={() => {
            if (workshop.benchPlan.value) router.go('bench')
          }}
        >
          To the Bench
        </button>
      </div>
    </div>
  )
}

export const Sheets = () => {
  const { workshop, sheetsOfBench } = useApp()
  const { planned, bench, shown } = usePlansToPrint()
  const differ = bench !== null && planned !== null
  return (
    <>
      {differ && (
        <fieldset class="row tight which">
          <legend>Sheets of</legend>
          {[false, true].map((each) => (
            <label key={String(each)} class="choice">
              <input
                type="radio"
                name="which"
                checked={sheetsOfBench.value === each}
                onChange={() => {
                  sheetsOfBench.value = each
                }}
              />
              {each ? 'the model on the Bench' : 'the latest plan of the Board'}
            </label>
          ))}
        </fieldset>
      )}
      {shown ? (
        <Laid key={shown.key} planned={shown} />
      ) : (
        <p class="empty">
          {workshop.computing.value ? 'The sheets lie here as soon as the plan is ready.' : 'There is no plan yet.'}
        </p>
      )}
    </>
  )
}
