import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { cruise, type ICruiseResult } from 'dependency-cruiser'
import ts from 'typescript'
import { describe, expect, it } from 'vitest'

const root = fileURLToPath(new URL('..', import.meta.url))

/** What each room of src may import, beside itself and packages (the table of DEVELOPERS.md). */
const media = ['media']
const wave = ['wave']
const model = [...wave, ...media, 'job', 'model']
const design = [...model, 'design']
const target = [...design, 'target']
const growth = [...target, 'growth']
const search = [...growth, 'search']
const batch = [...search, 'deliver', 'batch']
const allowed: Readonly<Record<string, readonly string[]>> = {
  wave,
  media,
  job: ['media', 'job'],
  model,
  design,
  target,
  growth,
  search,
  // Types of results, and the one logarithm; a second test holds it to that.
  deliver: ['job', 'media', 'wave', 'growth', 'target', 'design', 'model', 'deliver'],
  batch,
  cli: [...batch, 'cli'],
}

const { output } = await cruise(['src'], {
  baseDir: root,
  tsPreCompilationDeps: 'specify',
  doNotFollow: { path: 'node_modules' },
})
const modules = (output as ICruiseResult).modules.filter(({ source }) => source.startsWith('src/'))
const roomOf = (path: string) => /^src\/([^/]+)\//.exec(path)?.[1] ?? null
const links = modules.flatMap(({ source, dependencies }) =>
  dependencies.map(({ resolved, preCompilationOnly }) => ({
    from: source,
    to: resolved,
    onlyTypes: preCompilationOnly === true,
  })),
)

describe('imports', () => {
  it('are seen: every file of src is a module with its imports', () => {
    const files = (readdirSync(`${root}/src`, { recursive: true }) as string[]).filter((name) => /\.[tj]s$/.test(name))
    expect(new Set(modules.map(({ source }) => source))).toEqual(new Set(files.map((name) => `src/${name}`)))
    expect(links.some(({ from, to }) => roomOf(from) === 'cli' && roomOf(to) === 'batch')).toBe(true)
    expect(links.some(({ from, to }) => roomOf(from) === 'model' && roomOf(to) === 'wave')).toBe(true)
  })

  it('run one way between the rooms', () => {
    const against = links.filter(({ from, to }) => {
      const [here, there] = [roomOf(from), roomOf(to)]
      return here !== null && there !== null && !allowed[here].includes(there)
    })
    expect(against).toEqual([])
    expect(Object.keys(allowed).sort()).toEqual(
      [...new Set(modules.flatMap(({ source }) => roomOf(source) ?? []))].sort(),
    )
  })

  it('of another room go through its index.ts', () => {
    const around = links.filter(({ from, to }) => {
      const there = roomOf(to)
      return there !== null && there !== roomOf(from) && to !== `src/${there}/index.ts`
    })
    expect(around).toEqual([])
  })

  it('of the public library go everywhere, and nothing imports it', () => {
    expect(links.filter(({ to }) => to === 'src/index.ts')).toEqual([])
  })

  it('of deliver are types, but for jobs, media and the logarithm', () => {
    const values = links.filter(
      ({ from, to, onlyTypes }) =>
        roomOf(from) === 'deliver' && !['deliver', 'job', 'media', 'wave', null].includes(roomOf(to)) && !onlyTypes,
    )
    expect(values).toEqual([])
  })
})

describe('what enters a result', () => {
  const exact = [
    'sqrt',
    'abs',
    'floor',
    'ceil',
    'round',
    'trunc',
    'min',
    'max',
    'sign',
    'imul',
    'fround',
    'clz32',
    'PI',
    'LN2',
    'LN10',
    'LOG2E',
    'LOG10E',
    'SQRT2',
    'E',
  ]

  it('uses no function of Math whose last digit depends on the machine, and no power', () => {
    const found: string[] = []
    for (const { source } of modules) {
      if (roomOf(source) === 'cli' || !source.endsWith('.ts')) continue
      const file = ts.createSourceFile(source, readFileSync(`${root}/${source}`, 'utf8'), ts.ScriptTarget.Latest)
      visit(file, (node) => {
        const at = () => `${source}:${file.getLineAndCharacterOfPosition(node.getStart(file)).line + 1}`
        if (ts.isPropertyAccessExpression(node) && node.expression.getText(file) === 'Math') {
          if (!exact.includes(node.name.text)) found.push(`${at()} Math.${node.name.text}`)
        }
        if (
          node.kind === ts.SyntaxKind.AsteriskAsteriskToken ||
          node.kind === ts.SyntaxKind.AsteriskAsteriskEqualsToken
        ) {
          found.push(`${at()} a power`)
        }
      })
    }
    expect(found).toEqual([])
  })
})

function visit(node: ts.Node, see: (node: ts.Node) => void): void {
  see(node)
  node.forEachChild((child) => visit(child, see))
}
