import { jobSchema, type Node } from './schema.js'

/** Every key of the job format in Markdown: what it means, and a line as one would write it; a section for each place that holds keys. */
export function jobReference(): string {
  const root = jobSchema() as Node
  const sections: { readonly title: string; readonly node: Node }[] = [{ title: 'The job', node: root }]
  const seen = new Set<Node>()
  const lines = [
    '# The job file',
    '',
    'YAML 1.2, one job a file. Every quantity carries its unit; unknown keys are errors.',
    '',
  ]
  for (let s = 0; s < sections.length; s++) {
    const { title, node } = sections[s]
    lines.push(`## ${title}`, '', '| key | what | like |', '| --- | --- | --- |')
    for (const [key, inner] of Object.entries(node.properties ?? {})) {
      lines.push(`| \`${key}\` | ${cell(descriptionOf(inner, root))} | ${exampleOf(key, inner)} |`)
      for (const object of objectsIn(inner, root)) {
        if (seen.has(object)) continue
        seen.add(object)
        sections.push({ title: title === 'The job' ? `\`${key}\`` : `${title}, \`${key}\``, node: object })
      }
    }
    lines.push('')
  }
  return lines.join('\n')
}

function descriptionOf(node: Node, root: Node): string {
  if (node.description) return node.description
  const target = resolved(node, root)
  return target.description ?? target.anyOf?.find(({ description }) => description)?.description ?? ''
}

function exampleOf(key: string, { examples }: Node): string {
  const [example] = examples ?? []
  return example === undefined ? '' : `\`${key}: ${typeof example === 'string' ? example : flow(example)}\``
}

/** One line of YAML. */
function flow(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(flow).join(', ')}]`
  if (typeof value !== 'object' || value === null) return String(value)
  const inside = Object.entries(value).map(([key, part]) => `${key}: ${flow(part)}`)
  return `{ ${inside.join(', ')} }`
}

/** Schemas with keys that a value of this one may hold. */
function objectsIn(node: Node, root: Node): Node[] {
  const { properties, items, anyOf, additionalProperties } = resolved(node, root)
  if (properties) return [resolved(node, root)]
  const inner = [...(items ? [items] : []), ...(anyOf ?? [])]
  if (typeof additionalProperties === 'object') inner.push(additionalProperties)
  return inner.flatMap((part) => objectsIn(part, root))
}

function resolved(node: Node, root: Node): Node {
  if (node.$ref === undefined) return node
  return root.$defs?.[node.$ref.replace('#/$defs/', '')] ?? node
}

/** No bar may end a cell. */
function cell(text: string): string {
  return text.replaceAll('|', '\\|')
}
