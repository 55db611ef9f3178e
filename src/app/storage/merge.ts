/** Two tabs have changed one build: both changes are kept. */
import type { Build } from '../state/build'
import type { Job } from '../state/job'

const mergeJobs = (theirs: Job, ours: Job): Job => ({
  ...ours,
  glued: [...new Set([...theirs.glued, ...ours.glued])],
  started: Math.min(theirs.started, ours.started),
  changed: Math.max(theirs.changed, ours.changed),
})

/**
 * Our past, then whatever of theirs is not in it, so that undo reaches everything.
 * @param lost id of a model that the merged build will not hold: nothing of it can be reached
 */
const mergeHistories = (
  theirs: Build['history'],
  ours: Build['history'],
  lost: string | undefined,
): Build['history'] => {
  const known = new Set([...ours.past, ours.now].map((design) => JSON.stringify(design)))
  const missing = [...theirs.past, theirs.now].filter(
    (design) => !known.has(JSON.stringify(design)) && design.choices.solid !== lost,
  )
  return missing.length === 0 ? ours : { ...ours, past: [...ours.past, ...missing] }
}

/**
 * Our choices win, theirs are one step of undo away. What either tab glued counts as glued.
 *
 * @param theirs as the store holds it, with the newer revision
 */
export const mergeBuilds = (theirs: Build, ours: Build): Build => {
  const jobs = ours.jobs.map((job) => {
    const other = theirs.jobs.find(({ id }) => id === job.id)
    return other ? mergeJobs(other, job) : job
  })
  const model = ours.model ?? theirs.model
  // A build holds one model. Two tabs that took different ones keep ours.
  const lost = theirs.model?.id === model?.id ? undefined : theirs.model?.id
  return {
    ...ours,
    ...(model ? { model } : {}),
    history: mergeHistories(theirs.history, ours.history, lost),
    jobs: [...jobs, ...theirs.jobs.filter(({ id }) => !ours.jobs.some((job) => job.id === id))],
    job: ours.job ?? theirs.job,
    changed: Math.max(theirs.changed, ours.changed),
    revision: theirs.revision,
  }
}
