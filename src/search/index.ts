export { Archive } from './Archive.js'
export { jacobianDigits } from './jacobianDigits.js'
export { runUnit } from './runUnit.js'
export type * from './types.js'
