/** What a source file asks for: modules, and names that it does not declare itself. */
import { parseSync } from 'vite'

export interface Import {
  readonly specifier: string
  /** Vanishes when types are stripped: `import type`, `export type`, `import('…')` in a type. */
  readonly typeOnly: boolean
  readonly line: number
}

export interface Mention {
  readonly name: string
  readonly line: number
}

export interface SourceUses {
  readonly imports: readonly Import[]
  /** Names used and nowhere declared in the file: globals. */
  readonly globals: readonly Mention[]
  /** Names after a dot (`Math.random` in full, for the others the last name only). */
  readonly members: readonly Mention[]
}

interface Node {
  readonly type: string
  readonly start: number
  readonly [key: string]: unknown
}

const isNode = (value: unknown): value is Node =>
  typeof value === 'object' && value !== null && typeof (value as Node).type === 'string'

/** Children that are names but neither use nor declare a variable. */
const plainNames: Record<string, readonly string[]> = {
  MemberExpression: ['property'],
  Property: ['key'],
  MethodDefinition: ['key'],
  PropertyDefinition: ['key'],
  AccessorProperty: ['key'],
  TSAbstractMethodDefinition: ['key'],
  TSAbstractPropertyDefinition: ['key'],
  TSPropertySignature: ['key'],
  TSMethodSignature: ['key'],
  TSQualifiedName: ['right'],
  TSEnumMember: ['id'],
  TSNamedTupleMember: ['label'],
  TSImportType: ['qualifier'],
  ImportSpecifier: ['imported'],
  ExportSpecifier: ['exported'],
  ExportAllDeclaration: ['exported'],
  MetaProperty: ['meta', 'property'],
  LabeledStatement: ['label'],
  BreakStatement: ['label'],
  ContinueStatement: ['label'],
}

/** Children that declare names. */
const declaring: Record<string, readonly string[]> = {
  VariableDeclarator: ['id'],
  FunctionDeclaration: ['id', 'params'],
  FunctionExpression: ['id', 'params'],
  TSDeclareFunction: ['id', 'params'],
  TSEmptyBodyFunctionExpression: ['params'],
  ArrowFunctionExpression: ['params'],
  ClassDeclaration: ['id'],
  ClassExpression: ['id'],
  CatchClause: ['param'],
  ImportSpecifier: ['local'],
  ImportDefaultSpecifier: ['local'],
  ImportNamespaceSpecifier: ['local'],
  TSTypeAliasDeclaration: ['id'],
  TSInterfaceDeclaration: ['id'],
  TSEnumDeclaration: ['id'],
  TSModuleDeclaration: ['id'],
  TSTypeParameter: ['name'],
  TSMappedType: ['key'],
  TSFunctionType: ['params'],
  TSConstructorType: ['params'],
  TSMethodSignature: ['params'],
  TSCallSignatureDeclaration: ['params'],
  TSConstructSignatureDeclaration: ['params'],
  TSIndexSignature: ['parameters'],
}

const literal = (value: unknown): string | undefined =>
  isNode(value) && value.type === 'Literal' && typeof value.value === 'string' ? value.value : undefined

export const readSource = (path: string, text: string): SourceUses => {
  const { program, errors } = parseSync(path, text)
  if (errors.length > 0) throw new Error(`${path} cannot be read: ${errors[0]!.message}`)
  const imports: Import[] = []
  const declared = new Set<string>()
  const used: Mention[] = []
  const members: Mention[] = []
  const lineOf = (node: Node): number => text.slice(0, node.start).split('\n').length

  const addImport = (node: Node, source: unknown, typeOnly: boolean): void => {
    imports.push({ specifier: literal(source) ?? '(not a literal)', typeOnly, line: lineOf(node) })
  }

  const noteMember = (node: Node): void => {
    const property = node.property as Node
    const name = node.computed
      ? literal(property)
      : property.type === 'Identifier'
        ? (property.name as string)
        : undefined
    if (name === undefined) return
    const object = node.object as Node
    const full = object.type === 'Identifier' && object.name === 'Math' ? `Math.${name}` : name
    members.push({ name: full, line: lineOf(node) })
  }

  const visit = (node: Node, binding: boolean): void => {
    switch (node.type) {
      case 'ImportDeclaration':
        addImport(node, node.source, node.importKind === 'type')
        break
      case 'ExportNamedDeclaration':
      case 'ExportAllDeclaration':
        if (node.source) addImport(node, node.source, node.exportKind === 'type')
        break
      case 'ImportExpression':
        addImport(node, node.source, false)
        break
      case 'TSImportType':
        addImport(node, node.source, true)
        break
      case 'NewExpression': {
        const [first, second] = node.arguments as Node[]
        const callee = node.callee as Node
        const beside = second && isNode(second) && second.type === 'MemberExpression' && isNode(second.object)
        if (callee.name === 'URL' && beside && (second.object as Node).type === 'MetaProperty') {
          const target = literal(first)
          // As in a worker's address; it is resolved like an import.
          addImport(node, { type: 'Literal', value: target ?? '(not a literal)', start: node.start }, false)
        }
        break
      }
      case 'MemberExpression':
        noteMember(node)
        break
      case 'VariableDeclarator':
        // `const { random } = Math` is a member by another name.
        if (isNode(node.init) && node.init.name === 'Math' && (node.id as Node).type === 'ObjectPattern') {
          for (const property of (node.id as Node).properties as Node[]) {
            const key = property.key as Node | undefined
            if (key?.type === 'Identifier') members.push({ name: `Math.${key.name}`, line: lineOf(node) })
          }
        }
        break
      case 'Identifier':
        if (binding) declared.add(node.name as string)
        else used.push({ name: node.name as string, line: lineOf(node) })
        break
    }
    const fromElsewhere = node.type === 'ExportNamedDeclaration' && node.source
    for (const [key, value] of Object.entries(node)) {
      if (fromElsewhere && key === 'specifiers') continue
      if (plainNames[node.type]?.includes(key) && !node.computed) continue
      // Inside a pattern its values bind; defaults, computed keys and type notes only use.
      const uses = key === 'typeAnnotation' || key === 'right' || (key === 'key' && node.computed)
      const binds = (declaring[node.type]?.includes(key) ?? false) || (binding && !uses)
      for (const child of Array.isArray(value) ? value : [value]) if (isNode(child)) visit(child, binds)
    }
  }
  visit(program as unknown as Node, false)
  return { imports, globals: used.filter((mention) => !declared.has(mention.name)), members }
}
