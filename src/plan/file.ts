/** The plan as the text of `plan.json`. */
import type { Plan } from './types'

/**
 * One line for each panel, crease, piece, sheet and step, so that two plans can be compared line by line. Normals are
 * written as decimal fractions even when they are whole: some readers take the kind of number from how it is written, and
 * a list of whole numbers for a list that cannot hold fractions.
 */
export const planText = (plan: Plan): string => {
  const fields = Object.entries(plan).map(([name, value]) => {
    const text =
      Array.isArray(value) && value.length > 0
        ? `[\n${value.map((entry) => JSON.stringify(entry)).join(',\n')}\n]`
        : JSON.stringify(value)
    return `${JSON.stringify(name)}: ${text}`
  })
  const whole = /(?<=[[,])-?\d+(?=[\],])/g
  return `{\n${fields.join(',\n')}\n}\n`.replace(/"normal":\[[^\]]*\]/g, (normal) => normal.replace(whole, '$&.0'))
}
