import { sayChoices } from '../state/choices'
import type { Planned } from '../state/workshop'
import { useApp } from '../ui/context'
import { agoText, counted } from '../words/figures'

/** Which model is on the Bench, where there could be doubt, and the ones set aside. */
export const Others = ({ planned }: { planned: Planned }) => {
  const { workshop, solid } = useApp()
  const { jobs } = workshop.build.value
  const job = workshop.job.value
  const latest = workshop.planned.value
  const others = jobs.filter(({ id }) => id !== job?.id)
  const differs = job !== null && latest !== null && latest.key !== job.planKey
  if (!differs && others.length === 0) return null
  const isChiral = solid.value?.chiral ?? planned.plan.model.hand !== 'none'
  return (
    <div class="others">
      {differs && (
        <p>
          On the Bench: {sayChoices(planned.choices, isChiral)}. The Board has gone on to another plan; this one stays
          as you print and glue it.{' '}
          <button type="button" class="link" onClick={() => workshop.startOver()}>
            Begin a model of the new plan
          </button>
        </p>
      )}
      {others.map((other) => (
        <p key={other.id}>
          Set aside: {other.choices.heightMm} mm, {counted(other.glued.length, 'piece')} glued,{' '}
          {agoText(other.changed, Date.now())}.{' '}
          <button type="button" class="link" onClick={() => workshop.resumeJob(other.id)}>
            Go on with it
          </button>
        </p>
      ))}
    </div>
  )
}
