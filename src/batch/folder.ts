import { mkdirSync, rmSync, writeFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { InputError } from '../errors'

/** Where a path that was typed is meant to lead: npm changes into the project's folder, and says where it was called. */
const typedFrom = (): string =>
  (process.env.npm_lifecycle_event === 'batch' ? process.env.INIT_CWD : undefined) ?? process.cwd()

/**
 * Makes the folder if needed and tries a file in it, before any long work is done.
 * @throws InputError when it cannot be written to
 */
export const writableFolder = (typed: string): string => {
  const folder = resolve(typedFrom(), typed)
  try {
    mkdirSync(folder, { recursive: true })
    const probe = join(folder, `.probe-${process.pid}`)
    writeFileSync(probe, '')
    rmSync(probe)
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException
    const reason = `cannot be written to (${code}); name a folder that can be made or written to, for example --out my-plan`
    throw new InputError(`The folder ${folder} ${reason}.`, '--out')
  }
  return folder
}
