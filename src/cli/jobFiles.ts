import { readdirSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { UsageError } from './UsageError.js'

/** The job files that arguments name: files as they are, folders by the .yaml and .yml files in them, by name. */
export function jobFiles(args: readonly string[]): string[] {
  return args.flatMap((arg) => {
    const found = statSync(arg, { throwIfNoEntry: false })
    if (!found?.isDirectory()) return [arg]
    const inside = readdirSync(arg).filter((name) => /\.ya?ml$/.test(name) && !name.startsWith('.'))
    if (inside.length === 0) throw new UsageError(`The folder ${arg} holds no .yaml file. Name a job file.`)
    return inside.sort().map((name) => join(arg, name))
  })
}
