/**
 * Compiles the AssemblyScript kernel into `bytes.ts`, a module that carries it as base64. Run by `npm run build`;
 * with --print it writes to stdout instead.
 */
import { readFileSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import asc from 'assemblyscript/asc'

const here = dirname(fileURLToPath(import.meta.url))

const files = new Map([['kernel.ts', readFileSync(join(here, 'spectrum.as'), 'utf8')]])
let binary = null
const { error, stderr } = await asc.main(
  ['kernel.ts', '-o', 'kernel.wasm', '-O3', '--noAssert', '--runtime', 'stub', '--enable', 'simd', '--initialMemory', '4'],
  {
    readFile: (name) => files.get(name) ?? null,
    writeFile: (_name, contents) => {
      binary = contents
    },
    listFiles: () => [],
  },
)
if (error || binary === null) {
  process.stderr.write(`${stderr}\n${error?.message ?? 'The kernel was not written.'}\n`)
  process.exit(1)
}
const base64 = Buffer.from(binary).toString('base64')
const lines = base64.match(/.{1,112}/g).map((line) => `  '${line}',`)
const source = `/** The kernel of spectrum.as, compiled by build.js: base64 of ${binary.length} bytes of WebAssembly. */
export const kernelBase64 = [
${lines.join('\n')}
].join('')
`
if (process.argv.includes('--print')) process.stdout.write(source)
else writeFileSync(join(here, 'bytes.ts'), source)
