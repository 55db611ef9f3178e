import { join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

/** Top folder of the project. */
export const projectFolder = resolve(fileURLToPath(new URL('../..', import.meta.url)))

/** What tests build and may build again at any time. */
export const cacheFolder = join(projectFolder, 'node_modules', '.cache', 'facetwright')
