export { type Progress, RunError, type RunOptions, runJob } from './batch/index.js'
export type { Candidate, JobResult, RunRecord } from './deliver/index.js'
export { DesignError } from './design/index.js'
export {
  type Job,
  JobError,
  type JobProblem,
  jobSchema,
  type LayerRow,
  LayersError,
  readJob,
  readLayers,
} from './job/index.js'
export {
  type ElectronStack,
  type LightStack,
  type Medium,
  type OfWavelength,
  type PreparedSpectrum,
  prepareSpectrum,
  type Region,
  type ResonanceList,
  resonances,
  type Spectrum,
  type SpectrumOptions,
  StackError,
  spectrum,
  stackOf,
} from './model/index.js'
export { type Pole, type SpectrumOut, spectrumInto } from './wave/index.js'
