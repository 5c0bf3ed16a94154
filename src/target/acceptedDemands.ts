import type { Demand } from '../job/index.js'

/** The demands as the yield takes them: loosened by what each accepts. A curve that accepts an rms becomes a limit. */
export function acceptedDemands(demands: readonly Demand[]): Demand[] {
  return demands.map((demand) => {
    if (demand.accept === null) return demand
    if (demand.kind === 'curve') return { ...demand, mostRms: demand.accept.rms ?? null }
    return { ...demand, ...demand.accept }
  })
}
