export { Archive } from './Archive.js'
export { runUnit } from './runUnit.js'
export type * from './types.js'
