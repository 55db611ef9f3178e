/**
 * Serves the app as it is shipped: built once for all test files (by the state of the sources) and then handed out by
 * Vite's preview server. `servePages` serves the sources as they are, for pages that try one room alone.
 */
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync } from 'node:fs'
import type { AddressInfo } from 'node:net'
import { join } from 'node:path'
import { createServer, preview } from 'vite'
import { cacheFolder, projectFolder } from './cache'
import { once } from './once'

export interface Served {
  /** Ends with a slash. */
  readonly url: string
  readonly close: () => Promise<void>
}

const sources = ['index.html', 'package-lock.json', 'public', 'src', 'tsconfig.json', 'vite.config.ts']

/** Changes whenever a source file of the app was written. */
const sourceState = (): string => {
  const hash = createHash('sha256')
  const read = (path: string): void => {
    const full = join(projectFolder, path)
    if (!existsSync(full)) return
    const stat = statSync(full)
    if (stat.isDirectory()) for (const name of readdirSync(full).sort()) read(`${path}/${name}`)
    else hash.update(`${path} ${stat.size} ${stat.mtimeMs}\n`)
  }
  for (const path of sources) read(path)
  return hash.digest('hex').slice(0, 16)
}

const viteCommand = join(projectFolder, 'node_modules', 'vite', 'bin', 'vite.js')

/** Builds the app if its sources have changed since the last time. Gives the folder of the built app. */
export const buildApp = async (): Promise<string> => {
  const folder = join(cacheFolder, 'app')
  const built = join(folder, sourceState())
  await once(
    `${built}.lock`,
    () => existsSync(join(built, 'index.html')),
    () => {
      const fresh = `${built}.${process.pid}`
      mkdirSync(folder, { recursive: true })
      // A process of its own: inside a test runner Vite would take the runner's NODE_ENV and build for tests.
      const { NODE_ENV: _, VITEST: __, ...env } = process.env
      const args = [viteCommand, 'build', '--outDir', fresh, '--emptyOutDir', '--logLevel', 'warn']
      const run = spawnSync(process.execPath, args, { cwd: projectFolder, env, encoding: 'utf8' })
      if (run.status !== 0) throw new Error(`the app does not build:\n${run.stdout}${run.stderr}`)
      for (const name of readdirSync(folder)) {
        const old = join(folder, name)
        const anHourAgo = Date.now() - 3_600_000
        if (old !== fresh && statSync(old).mtimeMs < anHourAgo) rmSync(old, { recursive: true, force: true })
      }
      rmSync(built, { recursive: true, force: true })
      renameSync(fresh, built)
    },
  )
  return built
}

/** The built app on a free port of this machine; close it in `afterAll`. */
export const serveApp = async (): Promise<Served> => {
  const server = await preview({
    root: projectFolder,
    logLevel: 'warn',
    build: { outDir: await buildApp() },
    preview: { host: '127.0.0.1', port: 0, open: false },
  })
  const { port } = server.httpServer.address() as AddressInfo
  return { url: `http://127.0.0.1:${port}/`, close: () => server.close() }
}

/** The sources through Vite's development server: `<url>test/preview/page.html` and the like. */
export const servePages = async (): Promise<Served> => {
  const server = await createServer({
    root: projectFolder,
    logLevel: 'warn',
    // Of its own, so that two test files at a time do not fight over one cache of dependencies.
    cacheDir: join(cacheFolder, `pages-${process.pid}`),
    server: { host: '127.0.0.1', port: 0, hmr: false, watch: null },
  })
  await server.listen()
  const { port } = server.httpServer!.address() as AddressInfo
  return {
    url: `http://127.0.0.1:${port}/`,
    close: async () => {
      await server.close()
      rmSync(join(cacheFolder, `pages-${process.pid}`), { recursive: true, force: true })
    },
  }
}
