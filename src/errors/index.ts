/**
 * Two families, by whose fault it is.
 * `InputError`: what came from outside cannot be used; the message names the place and the remedy and is shown as is.
 * `BrokenPromise`: one of our own invariants failed; it carries ids and values for the report.
 */

/** Recoverable: shown to the builder. `message` says what is wrong, where, and what would be right, in one line. */
export class InputError extends Error {
  override readonly name = 'InputError'
  constructor(
    message: string,
    /** The setting, argument, file line or element at fault. */
    readonly place: string,
  ) {
    super(message)
  }
}

/** A defect in this program: a stage did not keep what it promises. Never shown without its details. */
export class BrokenPromise extends Error {
  override readonly name = 'BrokenPromise'
  constructor(
    message: string,
    readonly details: Readonly<Record<string, unknown>> = {},
  ) {
    super(`${message} ${JSON.stringify(details)}`)
  }
}

/** Thrown out of long work when the caller asked for it to stop. Not an error to report. */
export class Cancelled extends Error {
  override readonly name = 'Cancelled'
  constructor() {
    super('cancelled')
  }
}

/**
 * How long work reports and is stopped: called at every step with a fraction 0..1 of the stage.
 * It may throw `Cancelled`; stages must let that pass.
 */
export type Progress = (stage: string, fraction: number) => void

export const noProgress: Progress = () => {}
