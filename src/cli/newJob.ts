import { writeFileSync } from 'node:fs'
import { jobTemplate, type Kind } from '../job/index.js'
import { print } from './console.js'
import { exitCode } from './exitCodes.js'
import { UsageError } from './UsageError.js'

/** Writes NAME.yaml here, a commented job to start from; never over a file. */
export function newJob(name: string, { kind = 'electron' }: { readonly kind?: string }): number {
  if (kind !== 'electron' && kind !== 'light') throw new UsageError(`--kind is electron or light, not "${kind}".`)
  if (!/^[A-Za-z0-9][A-Za-z0-9-]{0,63}$/.test(name)) {
    throw new UsageError(`"${name}" is no name of a job. Use letters, digits and dashes, at most 64, no dash first.`)
  }
  const file = `${name}.yaml`
  try {
    writeFileSync(file, jobTemplate(name, kind satisfies Kind), { flag: 'wx' })
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error
    throw new UsageError(`${file} is here already. Choose another name, or move it.`)
  }
  print(file)
  return exitCode.done
}
