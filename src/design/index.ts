export { DesignError } from './DesignError.js'
export { designOf } from './designOf.js'
export type * from './types.js'
