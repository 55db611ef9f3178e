/** Cost of the skin: against the number of its panels, and against a general-purpose union of the same solids. */
import { textTable } from '../../src/batch/text-table'
import { computeSkin } from '../../src/skin'
import { buildSolid } from '../../src/solids'
import { fittedExponent, medianMs } from './measure'

const ids = [
  'icosidodecahedron',
  'small-stellated-dodecahedron',
  'great-icosahedron',
  'small-ditrigonal-icosidodecahedron',
  'great-rhombihexahedron',
  'icositruncated-dodecadodecahedron',
  'great-icosidodecahedron',
  'great-truncated-icosidodecahedron',
  'snub-dodecadodecahedron',
  'great-snub-icosidodecahedron',
  'great-inverted-snub-icosidodecahedron',
  'great-retrosnub-icosidodecahedron',
]

export const benchSkin = (): void => {
  const measured = ids.map((id) => {
    const solid = buildSolid(id, 'left')
    // Without its rotations every face plane has to be cut: what symmetry saves.
    const plain = { ...solid, rotations: solid.rotations.slice(0, 1) }
    const { panels } = computeSkin(solid)
    return {
      id,
      panels: panels.length,
      ms: medianMs(() => computeSkin(solid)),
      plainMs: medianMs(() => computeSkin(plain), 1, 0),
    }
  })
  const unit = measured[0]!.ms
  console.log('Skin, cost as a multiple of the first row')
  console.log(
    textTable(
      ['solid', 'panels', 'cost', 'cost per panel', 'without symmetry ×', 'ms here'],
      measured.map((m) => [
        m.id,
        m.panels,
        m.ms / unit,
        (m.ms / unit) * (measured[0]!.panels / m.panels),
        m.plainMs / m.ms,
        Math.round(m.ms),
      ]),
    ),
  )
  const fit = fittedExponent(measured.slice(1).map((m) => [m.panels, m.ms]))
  console.log(`cost grows like panels to the power ${fit.power.toFixed(2)} (r² ${fit.r2.toFixed(2)})\n`)
}
