/** The cut for a plan: nets of the kind asked for, and line contacts paired in the way that serves them. */
import type { Progress } from '../errors'
import { type Cut, type CutOptions, cutIntoPieces, usualEffort } from '../pieces'
import { type Skin, withPairing } from '../skin'

export interface CutSkin {
  /** The skin as it is paired for this cut. */
  readonly skin: Skin
  readonly cut: Cut
}

/**
 * Line contacts may be closed body by body or carry the skin across; which gives the better nets is tried out. The
 * pairing never leaves more separate parts than need be.
 */
export const cutSkin = (skin: Skin, options: CutOptions, progress: Progress): CutSkin => {
  const across = withPairing(skin, () => 'outside')
  const within = withPairing(skin, () => 'inside')
  const ways = [skin]
  // Nets that repeat need a pairing that repeats; the one found for the skin may be a tree that spans the bodies.
  if (options.nets === 'repeat' && skin.contacts.length > 0) ways[0] = within.parts <= skin.parts ? within : across
  if (options.nets !== 'single' && across.parts <= skin.parts && across !== ways[0]) ways.push(across)
  const worth = ({ pieces }: Cut): number =>
    options.nets === 'repeat' ? 1e6 * new Set(pieces.map((p) => p.template)).size + pieces.length : pieces.length
  // Two searches must not take twice as long as one.
  const effort = usualEffort(skin.panels.length) * (ways.length > 1 ? 0.5 : 1)
  let best: CutSkin | null = null
  ways.forEach((way, i) => {
    const cut = cutIntoPieces(way, { ...options, effort }, (stage, done) => progress(stage, (i + done) / ways.length))
    if (!best || worth(cut) < worth(best.cut)) best = { skin: way, cut }
  })
  return best!
}
