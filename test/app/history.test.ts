import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { change, type History, newHistory, redo, undo } from '../../src/app/state/history'

const same = (a: number, b: number): boolean => a === b

describe('undo and redo', () => {
  const seed = 20_261
  test(`behave like a list with a finger on it (seed ${seed})`, () => {
    const step = fc.oneof(fc.integer({ min: 0, max: 5 }), fc.constant('undo' as const), fc.constant('redo' as const))
    fc.assert(
      fc.property(fc.array(step, { maxLength: 60 }), (steps) => {
        let list = [0]
        let finger = 0
        let history: History<number> = newHistory(0)
        for (const each of steps) {
          if (each === 'undo') {
            finger = Math.max(0, finger - 1)
            history = undo(history)
          } else if (each === 'redo') {
            finger = Math.min(list.length - 1, finger + 1)
            history = redo(history)
          } else {
            if (list[finger] !== each) {
              list = [...list.slice(0, finger + 1), each]
              finger++
            }
            history = change(history, each, same)
          }
          expect([...history.past, history.now, ...history.future]).toEqual(list)
          expect(history.past).toHaveLength(finger)
        }
      }),
      { seed, numRuns: 300 },
    )
  })

  test('the past does not grow without end, and keeps the latest', () => {
    let history: History<number> = newHistory(0)
    for (let i = 1; i <= 1000; i++) history = change(history, i, same)
    expect(history.past.length).toBeLessThan(500)
    expect(undo(history).now).toBe(999)
  })
})
