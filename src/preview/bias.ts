/**
 * Who wins where two things lie in the same place, as a relative change of the inverse distance (1 / distance): the
 * same for the z-buffer, WebGL and picking.
 */

/** A panel's inside yields to another panel's outside in the same plane. */
export const backBias = -2e-5
/** Of two kinds of raw face in one plane the earlier kind wins. */
export const layerBias = -2e-6
/** There are no more layers than stay clear of `backBias`. */
export const layers = 8
/**
 * Lines stand out from the panels that they bound, and wider lines more, so that the half of a line that lies over its
 * own tilted panel is not hidden by it.
 *
 * @param widthPx width of the line, CSS px
 * @param focal `Camera.focal`: CSS px per unit of x / distance
 */
export const lineBias = (widthPx: number, focal: number): number =>
  Math.min(0.04, ((0.5 * widthPx + 0.3) * 1.6) / focal)
