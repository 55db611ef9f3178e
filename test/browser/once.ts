/**
 * Work that several test workers want done once: the first takes a lock folder, the others wait until the result is
 * there. A lock whose owner has died is taken over.
 */
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { setTimeout as sleep } from 'node:timers/promises'

const alive = (pid: number): boolean => {
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM'
  }
}

const ownerIsGone = (lock: string): boolean => {
  try {
    return !alive(Number(readFileSync(join(lock, 'pid'), 'utf8')))
  } catch {
    return false // the owner has not written its id yet, or has just finished
  }
}

/** Runs `work` under the lock folder `lock` unless `done()` says that it has been done; at most one process at a time. */
export const once = async (lock: string, done: () => boolean, work: () => void | Promise<void>): Promise<void> => {
  mkdirSync(dirname(lock), { recursive: true })
  while (!done()) {
    try {
      mkdirSync(lock)
    } catch {
      if (ownerIsGone(lock)) rmSync(lock, { recursive: true, force: true })
      else await sleep(150)
      continue
    }
    try {
      writeFileSync(join(lock, 'pid'), String(process.pid))
      if (!done()) await work()
    } finally {
      rmSync(lock, { recursive: true, force: true })
    }
    return
  }
}
