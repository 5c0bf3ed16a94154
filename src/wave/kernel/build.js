/**
 * Compiles the AssemblyScript kernel into `bytes.ts`, a module that carries it as base64. Run by `npm run build`;
 * with --print it writes to stdout instead.
 */
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import asc from 'assemblyscript/asc'

const here = dirname(fileURLToPath(import.meta.url))

// The compiler looks for .ts; these sources are called .as so that nothing takes them for TypeScript.
const read = (name) => {
  const file = join(here, name.replace(/\.ts$/, '.as'))
  return existsSync(file) ? readFileSync(file, 'utf8') : null
}
let binary = null
const { error, stderr } = await asc.main(
  ['kernel.ts', '-o', 'kernel.wasm', '-O3', '--noAssert', '--runtime', 'stub', '--enable', 'simd', '--initialMemory', '4'],
  {
    readFile: read,
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
const source = `/** The kernel of kernel.as, compiled by build.js: base64 of ${binary.length} bytes of WebAssembly. */
export const kernelBase64 = [
${lines.join('\n')}
].join('')
`
if (process.argv.includes('--print')) process.stdout.write(source)
else writeFileSync(join(here, 'bytes.ts'), source)
