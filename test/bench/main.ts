/** `npm run bench -- skin|plan …`, all without a name. Ratios within one run, for people; no test depends on it. */
import { benchMeshes } from './meshes'
import { benchPlan } from './plan'
import { benchSkin } from './skin'
import { benchUnion } from './union'

const benches: Readonly<Record<string, () => void | Promise<void>>> = {
  skin: async () => {
    benchSkin()
    await benchUnion()
    benchMeshes()
  },
  plan: benchPlan,
}

const asked = process.argv.slice(2)
const unknown = asked.find((name) => !Object.hasOwn(benches, name))
if (unknown !== undefined) {
  console.error(`There is no benchmark ${unknown}; there are ${Object.keys(benches).join(', ')}.`)
  process.exitCode = 2
} else {
  for (const name of asked.length > 0 ? asked : Object.keys(benches)) await benches[name]!()
}
