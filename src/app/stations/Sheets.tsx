import { useEffect } from 'preact/hooks'
import type { Planned } from '../state/workshop'
import { useApp } from '../ui/context'
import { usePages } from '../ui/pages'
import { usePlansToPrint } from '../ui/plans-to-print'
import { SheetPage } from './SheetPage'
import { Corner, Download, PiecesHere, ProblemsHere } from './SheetSide'
import { SheetStrip } from './SheetStrip'

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
      <SheetStrip pages={pages} index={index} onGo={go} />
      <SheetPage key={planned.key} pages={pages} index={index} planned={planned} onTurn={(by) => go(index + by)} />
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
