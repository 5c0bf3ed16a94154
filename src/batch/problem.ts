import { type Design, designOf } from '../design/index.js'
import { growthErrors, marginOf } from '../growth/index.js'
import type { Job } from '../job/index.js'
import type { RelaxedProblem, SearchChain, SearchProblem } from '../search/index.js'
import { acceptedDemands, compareScores, compileTarget, type Score, type Target } from '../target/index.js'
import type { WaveSystem } from '../wave/index.js'
import { searchChain } from './searchChain.js'

/** A job as the rooms see it: places and numbers for the search, and what they mean. */
export interface BoundJob {
  readonly problem: SearchProblem
  readonly design: Design
  readonly target: Target
  /** As the yield judges: with what the demands accept. */
  readonly accepted: Target
}

/** Binds the rooms to a job. Throws as designOf does. */
export function problemOf(job: Job): BoundJob {
  const design = designOf(job)
  const target = compileTarget(job)
  const loosened = job.demands.some(({ accept }) => accept !== null)
  const accepted = loosened ? compileTarget({ ...job, demands: acceptedDemands(job.demands) }) : target
  const curves = job.demands.filter(({ kind }) => kind === 'curve').length
  const onlyCurves = curves === job.demands.length
  const limitsAndGoals = curves > 0 && !onlyCurves
  let chain: SearchChain | null | undefined
  const problem: SearchProblem = {
    places: design.places,
    stackCount: () => design.stackCount(),
    points: target.pointShares.length,
    chain: () => {
      chain = chain === undefined ? searchChain(design, target) : chain
      return chain
    },
    feasible: (assignment) => design.feasible(assignment),
    repair: (assignment) => design.repair(assignment),
    canonical: (assignment) => design.canonical(assignment),
    bound: (assignment) => target.bound(design.systems(assignment)),
    // The points of peaks and bands are their maxima, which no bound knows.
    boundGuides: job.demands.every(({ kind }) => kind !== 'peak' && kind !== 'band'),
    // Beside a goal, a stack that meets the limits comes before one that does not, whatever the merits. Merits that are equal at
    // 9 digits lie up to 1e-8 apart; limits are met up to 1e-9.
    reach: ({ met, merit }) => (met || !limitsAndGoals ? merit * (1 + 1e-8) + 1e-9 : Number.POSITIVE_INFINITY),
    score: (assignment) => {
      const systems = design.systems(assignment)
      const { met, merit } = target.verdict(systems)
      const margin = met && !onlyCurves ? leastMargin({ design, target }, job, assignment, systems) : null
      return new StackScore(met, merit, margin, design.totalNm(assignment), assignment, design)
    },
    compare: compareScores(job),
    relax: (assignment) => relax(design, target, assignment),
    restructured: (assignment) => restructured(design, target, assignment),
  }
  return { problem, design, target, accepted }
}

/** What the order compares of a stack; the id, a hash that few comparisons need, when it is asked for. */
class StackScore implements Score {
  private readonly assignment: Int32Array
  private knownId: string | null = null

  constructor(
    readonly met: boolean,
    readonly merit: number,
    readonly margin: number | null,
    readonly totalNm: number,
    assignment: Int32Array,
    private readonly design: Design,
  ) {
    this.assignment = Int32Array.from(assignment)
  }

  get id(): string {
    this.knownId ??= this.design.id(this.assignment)
    return this.knownId
  }
}

/** The least over the conditions, each with the errors of growth as they change the media there. */
function leastMargin(
  { design, target }: Pick<BoundJob, 'design' | 'target'>,
  job: Job,
  assignment: Int32Array,
  systems: readonly WaveSystem[],
): number | null {
  const layers = design.layers(assignment)
  const evaluation = target.evaluate(systems)
  const limits = target.limits(systems, evaluation)
  const margins = systems.map((_, i) =>
    marginOf(
      limits.filter(({ condition }) => condition === i),
      growthErrors(layers, design.situations[i], job.growth),
    ),
  )
  // No demand may hold at a condition.
  return margins.reduce((least, margin) =>
    least === null ? margin : margin === null ? least : Math.min(least, margin),
  )
}

/** Needles by how fast they lower the merit of the fit, those that do; then the stacks without a thin layer. */
function restructured(design: Design, target: Target, assignment: Int32Array): Int32Array[] {
  const needles = design.needles(assignment)
  if (needles === null) return []
  const { systems, directions, inserted, removed } = needles
  const size = inserted.length
  if (size === 0 || target.fitSize === 0) return [...removed]
  const residuals = new Float64Array(target.fitSize)
  const jacobian = new Float64Array(target.fitSize * size)
  target.fit(systems, directions, size, residuals, jacobian)
  const slopes = inserted.map((_, v) => residuals.reduce((sum, r, i) => sum + r * jacobian[i * size + v], 0))
  const falling = inserted.map((_, v) => v).filter((v) => slopes[v] < 0)
  falling.sort((a, b) => slopes[a] - slopes[b] || a - b)
  // A thin layer less costs nothing to try.
  return [...falling.slice(0, 2).map((v) => inserted[v]), ...removed, ...falling.slice(2).map((v) => inserted[v])]
}

function relax(design: Design, target: Target, assignment: Int32Array): RelaxedProblem {
  const relaxed = design.relax(assignment)
  const variables = relaxed.start.length
  return {
    residuals: target.fitSize,
    start: relaxed.start,
    lower: relaxed.lower,
    upper: relaxed.upper,
    place: relaxed.place,
    valueOf: (variable, choice) => relaxed.valueOf(variable, choice),
    evaluate: (values, residuals, jacobian) =>
      target.fit(relaxed.systems(values), relaxed.directions(values), variables, residuals, jacobian),
    snap: (values) => relaxed.snap(values),
  }
}
