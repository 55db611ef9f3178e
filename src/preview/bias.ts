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
/** Lines stand out from the panels that they bound. */
export const lineBias = 7e-4
