import { jobReference, jobSchema } from '../job/index.js'
import { print } from './console.js'
import { exitCode } from './exitCodes.js'

/** Prints the JSON Schema of the job file, for editors; or all of it in words, for people. */
export function schema({ reference }: { readonly reference?: boolean }): number {
  print(reference ? jobReference() : JSON.stringify(jobSchema(), null, 2))
  return exitCode.done
}
