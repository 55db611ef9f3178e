/** What several stations do in the same way. */
import { InputError } from '../../errors'
import type { Planned } from '../state/workshop'
import { buildFileText, checkSavedFileSize, fileNameOf, readFileText, solidsNeeded } from '../storage/file'
import type { AppContext } from './context'
import { download } from './download'

export const nameOfBuild = ({ workshop, solid }: AppContext): string =>
  workshop.build.value.name || solid.value?.name || workshop.choices.value.solid

export const savePlanFile = async (app: AppContext, { plan }: Planned): Promise<void> => {
  const answer = await app.press.planText(plan)
  if (answer.ok) {
    download(`${fileNameOf(nameOfBuild(app))}-plan.json`, answer.value, 'application/json')
    app.announce('Plan saved to a file.')
  } else app.trouble.value = `The plan could not be written: ${answer.refusal.message}`
}

export const saveBuildFile = async (app: AppContext): Promise<void> => {
  const { workshop } = app
  const text = await buildFileText(workshop.build.peek(), (key) => workshop.keeper.plan(key))
  download(`${fileNameOf(nameOfBuild(app))}-build.json`, text, 'application/json')
  app.announce('Build saved to a file.')
}

/** Opens a plan or build file as a build of its own; what is open now stays in the list of builds. */
export const openFile = async (app: AppContext, file: File): Promise<boolean> => {
  try {
    checkSavedFileSize(file.size, file.name)
    const opened = readFileText(file.name, await file.text())
    const plans = opened.kind === 'plan' ? [opened.plan] : Object.values(opened.plans)
    const model = opened.kind === 'build' ? opened.build.model : undefined
    // The solids first, so that a file that is refused leaves nothing behind.
    for (const id of solidsNeeded(opened)) {
      const known = await app.press.knows(id)
      if (!known.ok || known.value || id === model?.id) continue
      throw new InputError(
        id.startsWith('own-')
          ? `${file.name} is about a model from a file and does not hold the model. Open the model itself, or a build file.`
          : `${file.name} is about a solid that this program does not know: ${id}.`,
        file.name,
      )
    }
    if (model) {
      const kept = await app.press.keepModel(model)
      if (!kept.ok) throw new InputError(`${file.name}: ${kept.refusal.message}`, file.name)
    }
    for (const plan of plans) {
      const answer = await app.press.check(plan)
      if (!answer.ok) throw new InputError(`${file.name} cannot be used: ${answer.refusal.message}`, file.name)
      const failed = answer.value.filter(({ ok }) => !ok)
      if (failed.length > 0) {
        const [first] = failed
        app.trouble.value = `${file.name} does not keep its promises (${first!.name}: ${first!.detail}). It is open, but compute the plan again before you print.`
      }
    }
    await app.workshop.openFile(opened)
    app.announce(`${file.name} is open.`)
    return true
  } catch (error) {
    app.trouble.value = error instanceof InputError ? error.message : `${file.name} cannot be read: ${String(error)}`
    return false
  }
}
