/**
 * How long the work takes and how small is too small. Common practice, no source; every figure is a default that the
 * builder's own pace may replace.
 */
export interface Rates {
  /** Stroke of a knife along a ruler. */
  readonly cutMmPerSecond: number
  /** Laying the ruler for one straight cut. */
  readonly secondsPerCut: number
  readonly scoreMmPerSecond: number
  readonly secondsPerScore: number
  readonly secondsPerFold: number
  /** A seam with a tab, setting under finger pressure included. */
  readonly secondsPerSeam: number
  /** A bare-edge seam: a run of glue, no tab to press. */
  readonly secondsPerButtSeam: number
  /** The last piece's seams together, over and above their own time. */
  readonly secondsToClose: number
  /** Finding and sorting one piece. */
  readonly secondsPerPiece: number
  readonly secondsPerSheet: number
}

/** Knife and ruler at an even pace. */
export const usualRates: Rates = {
  cutMmPerSecond: 65,
  secondsPerCut: 4,
  scoreMmPerSecond: 30,
  secondsPerScore: 3,
  secondsPerFold: 4,
  secondsPerSeam: 65,
  secondsPerButtSeam: 30,
  secondsToClose: 180,
  secondsPerPiece: 12,
  secondsPerSheet: 90,
}

/** What a width in mm asks for: narrowest width workable with fingers and knife 3 mm, tweezers 2 mm, machine 1 mm. */
export const toolForWidth = (widthMm: number): string =>
  widthMm >= 3
    ? 'fingers and knife'
    : widthMm >= 2
      ? 'tweezers'
      : widthMm >= 1
        ? 'a cutting machine'
        : 'too narrow for card'
