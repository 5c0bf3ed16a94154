export { compileTarget, type TargetSpec } from './compileTarget.js'
export { type Contradiction, contradictions } from './contradictions.js'
export { compareScores } from './order.js'
export type * from './types.js'
