#!/usr/bin/env node
import { Command, CommanderError } from 'commander'
import { engineVersion } from '../batch/index.js'
import { type CheckArguments, check } from './check.js'
import { sayError } from './console.js'
import { exitCode } from './exitCodes.js'
import { materials } from './materials.js'
import { newJob } from './newJob.js'
import { type RunArguments, run } from './run.js'
import { schema } from './schema.js'
import { UsageError } from './UsageError.js'

const program = new Command('tunnelwright')
  .description('Designs tunnelling filters that can really be grown: a job file in, ranked candidate stacks out.')
  .version(engineVersion)
  .showHelpAfterError('Write "tunnelwright --help" for what there is.')
  .exitOverride()
let code: number = exitCode.done

program
  .command('run')
  .description('run jobs; what is finished stays finished, what was interrupted goes on')
  .argument('<job...>', 'job files, or folders of them')
  .option('--threads <n>', 'worker threads (default: as many as the machine has)')
  .option('--results <dir>', 'where the folder of the results is made', 'results')
  .option('--until <time>', 'have results by this time of day, like 06:30')
  .option('--fresh', 'start anew; the old journal is kept under another name')
  .option('--json', 'print one object a job instead of the path of its table')
  .option('--quiet', 'no progress and no table')
  .option('--strict', 'exit code 3 when a job has no candidate that meets all its limits')
  .action(async (jobs: string[], options: RunArguments) => {
    code = await run(jobs, options)
  })

program
  .command('check')
  .description('read and explain jobs: variables, stacks on the lattice, time; writes nothing')
  .argument('<job...>', 'job files, or folders of them')
  .option('--gradients', 'check the derivatives that the search goes by, in digits')
  .action(async (jobs: string[], options: CheckArguments) => {
    code = await check(jobs, options)
  })

program
  .command('new')
  .description('write NAME.yaml, a commented job to start from')
  .argument('<name>', 'letters, digits, dashes')
  .option('--kind <kind>', 'electron or light; electron by default')
  .action((name: string, options: { readonly kind?: string }) => {
    code = newJob(name, options)
  })

program
  .command('materials')
  .description('the built-in materials, their numbers and where each comes from')
  .argument('[name]', 'one of them')
  .action((name: string | undefined) => {
    code = materials(name)
  })

program
  .command('schema')
  .description('print the JSON Schema of the job file')
  .option('--reference', 'print every key of the job file in words, as Markdown')
  .action((options: { readonly reference?: boolean }) => {
    code = schema(options)
  })

try {
  await program.parseAsync()
} catch (error) {
  if (error instanceof CommanderError) code = error.exitCode === 0 ? exitCode.done : exitCode.wrong
  else if (error instanceof UsageError) {
    sayError(error.message)
    code = exitCode.wrong
  } else {
    sayError((error as Error).stack ?? String(error))
    code = exitCode.failed
  }
}
process.exitCode = code
