import { closeSync, constants, fstatSync, openSync, readSync, realpathSync } from 'node:fs'
import { dirname, join, sep } from 'node:path'
import type { Tables } from './CsvTable.js'

/** Larger than any table of a spectrum. */
export const largestFile = 1_000_000

/**
 * Reads the tables of the job that lies in `folder`. A name leads to a regular file in that folder or below: no absolute
 * name, no way up, no symbolic link, no device. Files are read, never written.
 */
export function tablesIn(folder: string): Tables {
  return (name) => {
    const refused = refusedName(name)
    if (refused) return refused
    const full = join(folder, name)
    try {
      const root = realpathSync(folder)
      const place = realpathSync(dirname(full))
      // A folder that is a link could lead anywhere.
      if (place !== dirname(join(root, name)) && place + sep !== root + sep) return linked(name)
    } catch {
      return absent(name)
    }
    const text = readRegularFile(full)
    if (text === 'absent') return absent(name)
    if (text === 'link') return linked(name)
    if (text === 'special') return { rule: `${name} is no regular file.`, remedy: 'Name a CSV file.' }
    if (text === 'large') return { rule: `${name} is larger than 1 MB.`, remedy: 'Thin the table out.' }
    if (text === 'binary') return { rule: `${name} is no text in UTF-8.`, remedy: 'Save it as CSV in UTF-8.' }
    return text
  }
}

/** A name that no job may use for a file, whatever is there. */
export function refusedName(name: string): { rule: string; remedy: string } | null {
  const shown = name.length > 60 ? `${name.slice(0, 57)}...` : name
  const climbs = name.split(/[\\/]/).includes('..')
  const absolute = /^([\\/~]|[A-Za-z]:)/.test(name)
  if (climbs || absolute) {
    return {
      rule: `"${shown}" leads out of the folder of the job.`,
      remedy: 'Put the table beside the job file and write its name.',
    }
  }
  if (name.trim() === '' || name.length > 200 || /[\p{Cc}\\]/u.test(name)) {
    return {
      rule: `"${shown.replace(/\p{Cc}/gu, ' ')}" is no name of a file.`,
      remedy: 'Put the table beside the job file and write its name.',
    }
  }
  return null
}

type Unreadable = 'absent' | 'link' | 'special' | 'large' | 'binary'

/** The text of a regular file, or why there is none. With `followLinks` the file itself may be a link. */
export function readRegularFile(path: string, followLinks = false): { readonly text: string } | Unreadable {
  let handle: number
  try {
    // Without O_NONBLOCK the opening of a pipe would wait for a writer.
    const flags = constants.O_RDONLY | (constants.O_NONBLOCK ?? 0) | (followLinks ? 0 : (constants.O_NOFOLLOW ?? 0))
    handle = openSync(path, flags)
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'ELOOP' ? 'link' : 'absent'
  }
  try {
    if (!fstatSync(handle).isFile()) return 'special'
    const bytes = Buffer.alloc(largestFile + 1)
    let length = 0
    for (let read = 1; read > 0 && length < bytes.length; length += read) {
      read = readSync(handle, bytes, length, bytes.length - length, null)
    }
    if (length > largestFile) return 'large'
    return { text: new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes.subarray(0, length)) }
  } catch {
    return 'binary'
  } finally {
    closeSync(handle)
  }
}

function absent(name: string) {
  return {
    rule: `There is no file ${name} beside the job.`,
    remedy: 'Check its name; it is looked for in the folder of the job file.',
  }
}

function linked(name: string) {
  return { rule: `${name} is a symbolic link, or lies behind one.`, remedy: 'Copy the table beside the job file.' }
}
