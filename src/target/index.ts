export { compileTarget, type TargetSpec } from './compileTarget.js'
export { compareScores } from './order.js'
export type * from './types.js'
