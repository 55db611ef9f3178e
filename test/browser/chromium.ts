/**
 * A real Chromium for tests, in two lanes: with WebGL (in software where there is no GPU) and without any 3D context,
 * as a builder meets it on a machine whose driver is refused.
 */
import { execFileSync, spawnSync } from 'node:child_process'
import { accessSync, constants, existsSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { type Browser, type BrowserContext, chromium } from 'playwright-core'
import { cacheFolder } from './cache'
import { once } from './once'

export type Lane = 'webgl' | 'no-3d'
export const lanes: readonly Lane[] = ['webgl', 'no-3d']

const names = ['chromium', 'chromium-browser', 'google-chrome-stable', 'google-chrome', 'chrome']
const elsewhere = [
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
  '/snap/bin/chromium',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  'C:\\Program Files\\Chromium\\Application\\chrome.exe',
  'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
]

const isExecutable = (path: string): boolean => {
  try {
    accessSync(path, constants.X_OK)
    return true
  } catch {
    return false
  }
}

/** Where a Chromium is already installed, or undefined. `FACETWRIGHT_CHROMIUM` names one and then is the only one tried. */
export const installedChromium = (env: NodeJS.ProcessEnv = process.env): string | undefined => {
  const named = env.FACETWRIGHT_CHROMIUM
  if (named) return isExecutable(named) ? named : undefined
  const onPath = (env.PATH ?? '').split(delimiter).flatMap((folder) => names.map((name) => join(folder, name)))
  return [...elsewhere.slice(0, 1), ...onPath, ...elsewhere].find(isExecutable)
}

const remedy =
  'Browser tests need Chromium. Install it (Debian, Ubuntu: sudo apt-get install -y chromium), ' +
  'or set FACETWRIGHT_CHROMIUM to the path of a Chromium or Chrome that is already there.'

const aptGet = (...args: string[]): void => {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  const run = spawnSync('apt-get', args, { env, stdio: ['ignore', 'pipe', 'pipe'], encoding: 'utf8' })
  if (run.status !== 0) throw new Error(`apt-get ${args.join(' ')} failed:\n${run.stderr}\n${remedy}`)
}

/**
 * Path of a Chromium. When there is none and we are root on a Debian-like system (a fresh container), the package
 * `chromium` is installed first. Else throws with the command to run: a browser test is never silently left out.
 */
export const findChromium = async (): Promise<string> => {
  const there = installedChromium()
  if (there) return there
  const mayInstall = process.getuid?.() === 0 && existsSync('/etc/debian_version') && !process.env.FACETWRIGHT_CHROMIUM
  if (!mayInstall) throw new Error(remedy)
  await once(
    join(cacheFolder, 'install.lock'),
    () => installedChromium() !== undefined,
    () => {
      aptGet('update', '-qq')
      aptGet('install', '-y', '-qq', '--no-install-recommends', 'chromium')
    },
  )
  const path = installedChromium()
  if (!path) throw new Error(remedy)
  return path
}

const launchArguments = (lane: Lane): string[] => [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  ...(lane === 'no-3d' ? ['--disable-3d-apis'] : ['--enable-unsafe-swiftshader']),
]

/** A headless browser; close it in `afterAll`. */
export const launch = async (lane: Lane): Promise<Browser> =>
  chromium.launch({ executablePath: await findChromium(), args: launchArguments(lane) })

/** A browser whose storage lives in `folder` and so survives being closed and launched again. */
export const launchKept = async (lane: Lane, folder: string): Promise<BrowserContext> =>
  chromium.launchPersistentContext(folder, {
    executablePath: await findChromium(),
    args: launchArguments(lane),
    acceptDownloads: true,
  })

/** Version line of the browser, for reports. */
export const chromiumVersion = async (): Promise<string> =>
  execFileSync(await findChromium(), ['--version', '--no-sandbox'], { encoding: 'utf8' }).trim()
