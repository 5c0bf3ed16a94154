export type * from './job.js'
export { type LayerRow, LayersError, parseLayers, readLayers } from './readLayers.js'
