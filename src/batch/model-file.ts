/** A builder's model from disk. */
import { readFileSync, statSync } from 'node:fs'
import { basename } from 'node:path'
import { InputError, type Progress } from '../errors'
import { checkFileSize, type Model, readModel } from '../models'
import { typedPath } from './folder'

/** @throws InputError when there is no such file, or it is no model that can be used */
export const readModelFile = (typed: string, progress?: Progress): Model => {
  const path = typedPath(typed)
  try {
    const { size, isFile } = regular(path)
    if (!isFile) throw new InputError(`${typed} is no file; name a model, for example --file model.obj.`, '--file')
    checkFileSize(size, basename(path))
    return readModel(readFileSync(path), typed, progress)
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException
    if (code === undefined) throw error
    throw new InputError(
      `The file ${path} cannot be read (${code}); name a model, for example --file model.obj.`,
      '--file',
    )
  }
}

/** A pipe or a device has no size and may never end. */
const regular = (path: string): { size: number; isFile: boolean } => {
  const found = statSync(path)
  return { size: found.size, isFile: found.isFile() }
}
