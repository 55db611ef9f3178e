/** Runs the real command as a child process. */
import { spawn } from 'node:child_process'
import { join } from 'node:path'
import { projectFolder } from '../browser/cache'

export interface Outcome {
  readonly code: number | null
  readonly stdout: string
  readonly stderr: string
}

const outcome = (command: string, args: readonly string[], cwd: string): Promise<Outcome> =>
  new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd, stdio: ['ignore', 'pipe', 'pipe'] })
    const out: Buffer[] = []
    const err: Buffer[] = []
    child.stdout.on('data', (chunk: Buffer) => out.push(chunk))
    child.stderr.on('data', (chunk: Buffer) => err.push(chunk))
    child.on('error', reject)
    child.on('close', (code) => {
      resolve({ code, stdout: Buffer.concat(out).toString(), stderr: Buffer.concat(err).toString() })
    })
  })

/** As the README says, through npm; `cwd` is where it is called. */
export const npmBatch = (args: readonly string[], cwd: string = projectFolder): Promise<Outcome> =>
  outcome('npm', ['--prefix', projectFolder, 'run', '--silent', 'batch', '--', ...args], cwd)

/** The same program without npm, which saves its start. */
export const batch = (args: readonly string[]): Promise<Outcome> =>
  outcome(process.execPath, ['--import', 'tsx', join(projectFolder, 'src', 'batch', 'main.ts'), ...args], projectFolder)

export const words = (line: string): string[] => line.split(' ').filter((word) => word !== '')
