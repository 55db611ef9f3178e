/** Cost of the skin of a builder's meshes, and how long the longest stretch of work without a word is. */
import { textTable } from '../../src/batch/text-table'
import { computeSkin } from '../../src/skin'
import { heapMesh, sphereMesh } from '../support/meshes'

export const benchMeshes = (): void => {
  const rows = [sphereMesh(36), sphereMesh(71), heapMesh(320, 5), heapMesh(1250, 5)].map((solid) => {
    let last = performance.now()
    const begun = last
    let longest = 0
    const { panels } = computeSkin(solid, 'nonzero', () => {
      const now = performance.now()
      longest = Math.max(longest, now - last)
      last = now
    })
    const ms = performance.now() - begun
    longest = Math.max(longest, performance.now() - last)
    return [solid.name, solid.faces.length, panels.length, Math.round(ms), ms / solid.faces.length, Math.round(longest)]
  })
  console.log('Skin of meshes; the longest silence is what a cancel has to wait for where no worker can be ended')
  console.log(textTable(['mesh', 'triangles', 'panels', 'ms here', 'ms per triangle', 'longest silence ms'], rows))
  console.log()
}
