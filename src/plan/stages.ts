/**
 * A cache of one slot per stage: when the builder changes the paper, the skin is not computed again. The key of a stage
 * is everything that it depends on, so a hit gives the very result that computing would.
 */
export class StageCache {
  private readonly slots = new Map<string, { key: string; value: unknown }>()

  /** The value of `stage` for `key`, from the slot or by `compute`; nothing is kept when `compute` throws. */
  get<T>(stage: string, key: unknown, compute: () => T): T {
    const text = JSON.stringify(key)
    const slot = this.slots.get(stage)
    if (slot?.key === text) return slot.value as T
    const value = compute()
    this.slots.set(stage, { key: text, value })
    return value
  }
}
