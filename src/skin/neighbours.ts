/**
 * Which faces may meet which, by their boxes. For the solids of the catalogue nearly every face meets every other; for a
 * large mesh of small faces this keeps the cost near the number of true meetings.
 */
import { boxAround, boxGrid } from '../geometry/box-grid'
import type { FilledFace } from './filled-face'

/**
 * @param slack boxes are grown by this much, so that faces that only touch are found
 * @returns for the faces of one plane, all faces of other planes whose boxes meet theirs, in ascending order
 */
export const neighbourFinder = (
  faces: readonly FilledFace[],
  slack: number,
): ((own: readonly FilledFace[]) => FilledFace[]) => {
  // The boundary is closed, so the starts of its segments are all its corners.
  const boxes = faces.map((f) =>
    boxAround(
      f.boundary.map(([a]) => a),
      slack,
    ),
  )
  const meeting = boxGrid(boxes)
  return (own) => {
    const found = new Set<number>()
    for (const face of own)
      meeting(boxes[face.index]!, (f) => {
        if (faces[f]!.plane !== face.plane) found.add(f)
      })
    return [...found].sort((a, b) => a - b).map((f) => faces[f]!)
  }
}
