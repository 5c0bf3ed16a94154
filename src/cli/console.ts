import { createColors } from 'picocolors'

/** Colours only for a terminal on stderr that does not refuse them. */
export const colours = createColors(
  process.stderr.isTTY === true && !process.env.NO_COLOR && process.env.TERM !== 'dumb',
)

// Who reads may have read enough (`| head`): what is left to print has no reader, and what runs goes on.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error
  })
}

/** Progress and everything for people. */
export function say(text: string): void {
  process.stderr.write(`${text}\n`)
}

/** What a script would read. */
export function print(text: string): void {
  process.stdout.write(`${text}\n`)
}

export function sayError(text: string): void {
  say(`${colours.red('error')}  ${text}`)
}
