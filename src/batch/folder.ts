import { existsSync, mkdirSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join, resolve } from 'node:path'
import { InputError } from '../errors'

/** Where a path that was typed is meant to lead: npm changes into the project's folder, and says where it was called. */
const typedFrom = (): string =>
  (process.env.npm_lifecycle_event === 'batch' ? process.env.INIT_CWD : undefined) ?? process.cwd()

/** The path that is meant by what was typed. */
export const typedPath = (typed: string): string => resolve(typedFrom(), typed)

/**
 * Makes a folder and those above it one at a time. Node's own recursive mkdir never comes back where a file system says
 * that a folder is missing right after it was asked to make it (such as /proc).
 */
const makeFolders = (folder: string): void => {
  if (existsSync(folder)) return
  if (dirname(folder) !== folder) makeFolders(dirname(folder))
  mkdirSync(folder)
}

/**
 * Makes the folder if needed and tries a file in it, before any long work is done.
 * @throws InputError when it cannot be written to
 */
export const writableFolder = (typed: string): string => {
  const folder = typedPath(typed)
  try {
    makeFolders(folder)
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
