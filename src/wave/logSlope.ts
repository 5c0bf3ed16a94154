import { admittance, type ComplexSweep, type Continuation } from './complexSweep.js'
import { hardWall } from './types.js'

const lead = new Float64Array(4)
const open: Continuation = { entryOpen: true, exitOpen: true }

/**
 * d(ln T)/dE (1/eV) at a real energy between open leads: T = 4 Y_entry Y_exit/|F|² and so Y'/Y of both leads less
 * 2 Re(F'/F). Keeps its digits where T itself underflows.
 */
export function logSlope(sweep: ComplexSweep, energy: number): number {
  const { entry, exit } = sweep.system.stack
  sweep.evaluate(energy, 0, open)
  const out = sweep.out
  const slope =
    (-2 * (out[0] * out[2] + out[1] * out[3])) / (out[0] * out[0] + out[1] * out[1]) + leadSlope(sweep, entry)
  return exit === hardWall ? slope : slope + leadSlope(sweep, exit)
}

/** (Re Y)'/Re Y. */
function leadSlope(sweep: ComplexSweep, m: number): number {
  admittance(sweep.at, m, true, lead)
  return lead[2] / lead[0]
}
