/** Beside the page: the model in the corner, the pieces by name, what is marked, and the way to paper. */
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
import { ModelView } from '../ui/ModelView'
import type { Pages } from '../ui/pages'
import { problemsOn } from '../ui/problems'
import { pieceByPanel, planItems } from '../ui/scene'
import { vantage } from '../ui/vantage'
import { counted, listed, mmText } from '../words/figures'

/** The pointer rests this long on a panel before its page is turned to, ms. */
const dwell = 450

/** Pieces of the page as buttons: the way for keyboard and screen reader to do what the pointer does. */
export const PiecesHere = ({ page, planned }: { page: PageSummary | undefined; planned: Planned }) => {
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
export const ProblemsHere = ({ page, planned }: { page: PageSummary | undefined; planned: Planned }) => {
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

export const Corner = ({
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

export const Download = ({ planned }: { planned: Planned }) => {
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
