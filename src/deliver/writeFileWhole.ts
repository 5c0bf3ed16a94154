import { closeSync, fsyncSync, openSync, renameSync, rmSync, writeSync } from 'node:fs'
import { dirname } from 'node:path'

/** What a file is called until it is whole. */
export const partSuffix = '.part'

/**
 * Writes a file so that its name never stands for half of it: written beside under another name, forced to the disk, renamed
 * over the old one, and the folder forced to the disk too. After a kill at any moment the name holds the old text or the new.
 *
 * @throws what the file system says (no space, no permission); the old file is then untouched
 */
export function writeFileWhole(path: string, text: string): void {
  const part = path + partSuffix
  rmSync(part, { force: true })
  try {
    // 'wx' makes the file: should a link have been put there meanwhile, it is refused and not followed.
    withDescriptor(part, 'wx', (descriptor) => {
      const bytes = Buffer.from(text, 'utf8')
      for (let done = 0; done < bytes.length; ) done += writeSync(descriptor, bytes, done)
      fsyncSync(descriptor)
    })
    renameSync(part, path)
  } catch (error) {
    rmSync(part, { force: true })
    throw error
  }
  syncFolder(dirname(path))
}

/** Makes renames in a folder outlive a power loss. */
export function syncFolder(folder: string): void {
  // Windows opens no folders; its renames are journalled by the file system.
  if (process.platform !== 'win32') withDescriptor(folder, 'r', fsyncSync)
}

function withDescriptor(path: string, flags: string, use: (descriptor: number) => void): void {
  const descriptor = openSync(path, flags)
  try {
    use(descriptor)
  } finally {
    closeSync(descriptor)
  }
}
