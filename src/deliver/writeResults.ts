import { mkdirSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import type { Job } from '../job/index.js'
import { candidateFolder, openCandidateFolder, removeStaleCandidates } from './candidateFolders.js'
import { candidatesCsv } from './candidatesCsv.js'
import { layersCsv } from './layersCsv.js'
import { profileCsv } from './profileCsv.js'
import { profilePlot } from './profilePlot.js'
import { recordJson } from './recordJson.js'
import { resonancesCsv } from './resonancesCsv.js'
import { spectrumCsv } from './spectrumCsv.js'
import { transmissionPlot } from './transmissionPlot.js'
import type { Candidate, JobResult } from './types.js'
import { writeFileWhole } from './writeFileWhole.js'

/**
 * Writes everything that a night hands over but the journal: a folder a candidate, candidates.csv, job.yaml, record.json.
 *
 * record.json goes first and comes back last: a folder that has one is whole, and what a kill left in the middle has none until
 * the same command is given again. Candidates of an earlier, longer list are removed; files of other people stay.
 *
 * @param folder results/NAME; made when absent
 * @throws what the file system says, or that a candidate's folder is a link out of the results
 */
export function writeResults(folder: string, job: Job, result: JobResult): void {
  mkdirSync(folder, { recursive: true })
  const record = join(folder, 'record.json')
  rmSync(record, { force: true })
  writeFileWhole(join(folder, 'job.yaml'), job.text)
  for (const candidate of result.candidates) {
    const place = openCandidateFolder(folder, candidate.rank)
    for (const [name, text] of candidateFiles(job, candidate)) writeFileWhole(join(place, name), text)
  }
  const demandIds = job.demands.map((demand) => demand.id)
  writeFileWhole(join(folder, 'candidates.csv'), candidatesCsv(result.candidates, demandIds, job.kind))
  removeStaleCandidates(folder, new Set(result.candidates.map(({ rank }) => candidateFolder(rank))))
  writeFileWhole(record, recordJson(job, result))
}

function candidateFiles(job: Job, candidate: Candidate): [name: string, text: string][] {
  return [
    ['layers.csv', layersCsv(candidate.layers, job, candidate.evaluation.peak?.energyEv ?? null)],
    ['spectrum.csv', spectrumCsv(candidate.spectra, job.kind)],
    ['resonances.csv', resonancesCsv(candidate.resonances)],
    ['profile.csv', profileCsv(candidate.profile, job.kind)],
    ['transmission.svg', transmissionPlot(job, candidate)],
    ['profile.svg', profilePlot(job, candidate)],
  ]
}
