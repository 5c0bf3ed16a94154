import { jobSchema } from '../job/index.js'
import { print } from './console.js'
import { exitCode } from './exitCodes.js'

/** Prints the JSON Schema of the job file, for editors. */
export function schema(): number {
  print(JSON.stringify(jobSchema(), null, 2))
  return exitCode.done
}
