export { atan2, cos, exp, log, log1p, log10, sin, sinCos } from './elementary.js'
export { type SpectrumOut, spectrumInto } from './spectrum.js'
export * from './types.js'
