import { type Alias, type Document, isAlias, isMap, isScalar, isSeq, type Node, type YAMLMap } from 'yaml'
import { most } from './guardYaml.js'
import type { Problems } from './Problems.js'
import { type Span, shortened } from './problemAt.js'
import type { Path } from './YamlSource.js'

/**
 * The plain value of a document: maps become objects without prototype, every number is finite. Where each part stands goes
 * into the source; what is not in order becomes undefined and a problem. Undefined as a whole where the aliases run wild.
 */
export function plainValue(document: Document.Parsed, problems: Problems): unknown {
  const { source } = problems
  const open = new Set<Node>()
  let visited = 0
  let aliases = 0
  let wild = false
  const value = plain(document.contents as Node, [])
  return wild ? undefined : value

  function plain(node: Node | null, path: Path, key?: Span): unknown {
    if (node === null || wild) return null
    visited++
    const span = spanOf(node)
    source.record(path, span, key)
    if (isAlias(node)) return behind(node, span, path, key)
    if (node.tag && !knownTags.has(node.tag)) {
      problems.addAt(span, `The tag ${shortened(node.tag)} is not part of the job format.`, 'Leave it out.')
      return undefined
    }
    if (isSeq(node)) return node.items.map((item, i) => plain(item as Node, [...path, i]))
    if (isMap(node)) return mapOf(node, path)
    if (!isScalar(node)) return undefined
    if (typeof node.value !== 'number' || Number.isFinite(node.value)) return node.value
    const written = shortened(source.written(path))
    problems.addAt(span, `${written} is not a finite number.`, 'Write a number within 1e-300..1e300.')
    return undefined
  }

  function mapOf(node: YAMLMap, path: Path): Record<string, unknown> {
    const map: Record<string, unknown> = Object.create(null)
    for (const pair of node.items) {
      const keyNode = pair.key as Node | null
      const span = keyNode ? spanOf(keyNode) : spanOf(node)
      if (!isScalar(keyNode) || keyNode.value === null || typeof keyNode.value === 'object') {
        problems.addAt(span, 'A key has to be a name.', 'Write it as "key: value".')
        continue
      }
      const name = String(keyNode.value)
      if (name === '__proto__') problems.addAt(span, 'Unknown key "__proto__".', 'Leave it out.')
      else if (Object.hasOwn(map, name)) {
        problems.addAt(span, `"${shortened(name)}" stands twice in the same map.`, 'Keep one of the two.')
      } else map[name] = plain(pair.value as Node, [...path, name], span)
    }
    return map
  }

  /** An alias can lead into itself, and a few lines of them can stand for more than a memory holds. */
  function behind(alias: Alias, span: Span, path: Path, key?: Span): unknown {
    const target = alias.resolve(document) as Node | undefined
    if (!target) {
      problems.addAt(span, `The alias ${shortened(source.written(path))} has no anchor.`, 'Write the value out.')
      return undefined
    }
    aliases++
    if (open.has(target) || aliases > most.aliases || visited > most.tokens || path.length > most.depth) {
      wild = true
      problems.addAt(
        span,
        `The alias ${shortened(source.written(path))} multiplies without end.`,
        'Write the value out.',
      )
      return undefined
    }
    open.add(target)
    const value = plain(target, path, key)
    open.delete(target)
    source.record(path, span, key)
    return value
  }
}

const knownTags = new Set(
  ['str', 'int', 'float', 'bool', 'null', 'map', 'seq'].map((tag) => `tag:yaml.org,2002:${tag}`),
)

export function spanOf(node: Node): Span {
  const [start, end] = node.range ?? [0, 1]
  return { start, end }
}
