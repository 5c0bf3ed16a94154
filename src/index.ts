export { type LayerRow, readLayers } from './job/index.js'
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
