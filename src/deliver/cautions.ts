import type { Kind } from '../job/index.js'

/** What no sheet, picture or record may leave out (design 9): one line each. */
export function cautions(kind: Kind): readonly string[] {
  return [
    'Calculated forecast for ideal layers; not a safety component; check by measurement before use.',
    kind === 'electron'
      ? 'Growth uses toxic gases and metals: only under local codes and by licensed practice.'
      : 'Coating materials and their fumes can be toxic: only under local codes and by licensed practice. No certified eye protection.',
  ]
}
