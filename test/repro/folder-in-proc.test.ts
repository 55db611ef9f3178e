/** Making a folder under /proc went on for ever: the recursive mkdir of Node tries again each time it is told ENOENT. */
import { existsSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { expect, test } from 'vitest'
import { writableFolder } from '../../src/batch/folder'

test.runIf(existsSync('/proc/self'))('a folder that cannot be made is said, not tried for ever', () => {
  expect(() => writableFolder('/proc/facetwright')).toThrow(/cannot be written to/)
})

test('folders within folders are made', () => {
  const root = mkdtempSync(join(tmpdir(), 'facetwright-'))
  const deep = join(root, 'a', 'b', 'c')
  expect(writableFolder(deep)).toBe(deep)
  expect(existsSync(deep)).toBe(true)
  rmSync(root, { recursive: true })
})
