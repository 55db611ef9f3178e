/** What holds the bodies of a model together, in words. */
import type { Plan, PlanDocket } from '../plan/types'

const counted = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`

/** One sentence on the places where bodies touch, e.g. `12 stretches held only along a line: 7 by a fold across`. */
export const holdWords = (docket: PlanDocket): string => {
  const { contacts, lineContacts } = docket
  const list = contacts ?? []
  const lines = list.filter((c) => c.kind === 'line')
  const points = list.length - lines.length
  const total = contacts ? lines.length : lineContacts
  if (total === 0 && points === 0) return 'nothing is held only along a line'
  const held = (how: string): number => list.filter((c) => c.held === how).length
  const ways = [
    [held('fold'), 'by a fold across'],
    [held('seam'), 'by a seam across'],
    [held('strip'), 'needing a strip'],
    [held('gusset'), 'needing a gusset'],
    [held('apart'), 'where each side closes by itself'],
  ] as const
  const places = [
    ...(total > 0 ? [`${counted(total, 'stretch', 'stretches')} held only along a line`] : []),
    ...(points > 0 ? [`${counted(points, 'point')} where bodies only touch`] : []),
  ].join(', ')
  const how = ways.filter(([n]) => n > 0).map(([n, way]) => `${n} ${way}`)
  return how.length > 0 ? `${places}: ${how.join(', ')}` : places
}

/** For a model that falls into parts: a line for each, with what joins it to those before; else an empty list. */
export const partWords = (plan: Plan): string[] =>
  (plan.docket.parts ?? []).map(({ bodies, pieces, joint }) => {
    const what = `${counted(bodies.length, 'body', 'bodies')}, ${counted(pieces.length, 'piece')} (${spans(pieces.map((p) => plan.pieces[p]!.step))})`
    if (joint === 'first') return `${what}: build it first`
    if (joint === 'apart') return `${what}: touches no other part, stands by itself`
    return joint === 'strip'
      ? `${what}: join it with a glued strip along the line where it touches`
      : `${what}: join it with a gusset inside, at the point where it touches`
  })

/** Step numbers as spans: 1–4, 7. */
const spans = (steps: readonly number[]): string => {
  const sorted = [...steps].sort((a, b) => a - b)
  const runs: [number, number][] = []
  for (const s of sorted) {
    const last = runs[runs.length - 1]
    if (last && s === last[1] + 1) last[1] = s
    else runs.push([s, s])
  }
  return runs.map(([a, b]) => (a === b ? `${a}` : `${a}–${b}`)).join(', ')
}
