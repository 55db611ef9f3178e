/** A strict reader of the part of JSON Schema (draft 2020-12) that `planSchema` uses; an unknown keyword is an error. */
import { BrokenPromise } from '../errors'
import type { Schema } from './schema'

const known = new Set<string>([
  ...['$schema', '$ref', '$defs', 'title', 'description', 'type', 'const', 'enum', 'pattern', 'minLength', 'minimum'],
  ...['maximum', 'exclusiveMinimum', 'properties', 'required', 'additionalProperties', 'items', 'minItems', 'maxItems'],
])

const typeOf = (value: unknown): string =>
  Array.isArray(value) ? 'array' : value === null ? 'null' : typeof value === 'number' ? 'number' : typeof value

const isType = (value: unknown, type: string): boolean =>
  type === 'integer' ? Number.isInteger(value) : typeOf(value) === type && (type !== 'number' || Number.isFinite(value))

/** One line per fault, with its place; empty if `value` conforms. */
export const schemaFaults = (root: Schema, value: unknown): string[] => {
  const faults: string[] = []
  const visit = (schema: Schema, here: unknown, place: string): void => {
    for (const keyword of Object.keys(schema))
      if (!known.has(keyword)) throw new BrokenPromise('Unknown keyword in a schema.', { keyword })
    const say = (what: string): number => faults.push(`${place}: ${what}`)
    if (schema.$ref) {
      const target = root.$defs?.[schema.$ref.replace('#/$defs/', '')]
      if (!target) throw new BrokenPromise('A reference in a schema leads nowhere.', { ref: schema.$ref })
      visit(target, here, place)
    }
    if (schema.const !== undefined && here !== schema.const) say(`is not ${schema.const}`)
    if (schema.enum && !schema.enum.includes(here as string)) say(`is none of ${schema.enum.join(', ')}`)
    if (schema.type && !isType(here, schema.type)) {
      say(`is ${typeOf(here)}, not ${schema.type}`)
      return
    }
    if (typeof here === 'string') {
      if (schema.pattern && !new RegExp(schema.pattern, 'u').test(here)) say(`does not match ${schema.pattern}`)
      if (here.length < (schema.minLength ?? 0)) say('is too short')
    } else if (typeof here === 'number') {
      if (here < (schema.minimum ?? -Infinity)) say(`is under ${schema.minimum}`)
      if (here > (schema.maximum ?? Infinity)) say(`is over ${schema.maximum}`)
      if (here <= (schema.exclusiveMinimum ?? -Infinity)) say(`is not over ${schema.exclusiveMinimum}`)
    } else if (Array.isArray(here)) {
      if (here.length < (schema.minItems ?? 0)) say(`has fewer than ${schema.minItems} entries`)
      if (here.length > (schema.maxItems ?? Infinity)) say(`has more than ${schema.maxItems} entries`)
      if (schema.items) for (const [i, item] of here.entries()) visit(schema.items, item, `${place}[${i}]`)
    } else if (typeOf(here) === 'object') {
      const fields = here as Record<string, unknown>
      for (const name of schema.required ?? []) if (fields[name] === undefined) say(`has no ${name}`)
      for (const [name, field] of Object.entries(fields)) {
        const property = schema.properties?.[name]
        if (property) visit(property, field, `${place}.${name}`)
        else if (schema.additionalProperties === false) say(`has an extra field ${name}`)
      }
    }
  }
  visit(root, value, 'plan')
  return faults
}
