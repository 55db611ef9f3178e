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
 * Our choices win, theirs are one step of undo away. What either tab glued counts as glued.
 *
 * @param theirs as the store holds it, with the newer revision
 */
export const mergeBuilds = (theirs: Build, ours: Build): Build => {
  const same = JSON.stringify(theirs.history.now) === JSON.stringify(ours.history.now)
  const jobs = ours.jobs.map((job) => {
    const other = theirs.jobs.find(({ id }) => id === job.id)
    return other ? mergeJobs(other, job) : job
  })
  return {
    ...ours,
    history: same ? ours.history : { ...ours.history, past: [...ours.history.past, theirs.history.now] },
    jobs: [...jobs, ...theirs.jobs.filter(({ id }) => !ours.jobs.some((job) => job.id === id))],
    job: ours.job ?? theirs.job,
    changed: Math.max(theirs.changed, ours.changed),
    revision: theirs.revision,
  }
}
