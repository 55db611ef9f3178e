import type { Planned } from '../state/workshop'
import { useApp } from './context'

/**
 * The plans whose sheets may be wanted: the Board's latest, and the one on the Bench where it is another one. A spoiled
 * sheet must be printed again as it was, whatever the Board says by now.
 */
export const usePlansToPrint = (): { planned: Planned | null; bench: Planned | null; shown: Planned | null } => {
  const { workshop, sheetsOfBench } = useApp()
  const planned = workshop.planned.value
  const onBench = workshop.job.value ? workshop.benchPlan.value : null
  const bench = onBench && onBench.key !== planned?.key ? onBench : null
  return { planned, bench, shown: bench && (sheetsOfBench.value || !planned) ? bench : planned }
}
