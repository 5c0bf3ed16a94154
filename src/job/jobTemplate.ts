import type { Kind } from './job.js'

/** A commented job to start from; readJob accepts it as it is. `name`: letters, digits, dashes. */
export function jobTemplate(name: string, kind: Kind): string {
  return kind === 'electron' ? ofElectrons(name) : ofLight(name)
}

function ofElectrons(name: string): string {
  return `format: 1
name: ${name}            # also the folder under results/
kind: electron
note: What the filter is for.
temperature: 77 K
# bias: 100 mV                   # lowers the edge of the exit, linearly over all layers
# conditions: { rest: { bias: 0 mV }, on: { bias: 100 mV } }   # several operating points; "at: on" ties a demand to one

stack:                           # written from entry to exit, as the electron meets it
  entry: GaAs
  layers:
    # A fixed width, a range, or a range with a step; ML are whole monolayers of the layer's own material.
    - { id: outer, material: AlGaAs, x: { pick: [0.25, 0.35] }, width: 6..20 ML }
    - { id: well, material: GaAs, width: 10..30 ML }
    - { like: outer }            # the same material, composition and width, whatever they become
    # - { repeat: 3, period: [ ... ], between: [ ... ] }
    # - { potential: 0.2..0.4 eV step 5 meV, mass: 0.09, width: 2..5 nm }    # a medium by its numbers
  exit: GaAs                     # or: hard wall
  # mirror: true                 # reflect about the last layer
  # rising: [outer, well]        # widths that may not fall in this order
  # strained to: InP             # default: the lead at the side of the substrate

target:
  scan: 5..200 meV               # above the band edge of the entry
  demands:
    - { peak: 80 meV, within: 5 meV, fwhm: 1..4 meV, height: 0.8 }
    # - { band: 80 meV, within: 5 meV, fwhm: 8..16 meV, top: 0.9, ripple: 0.3 }
    # - { pass: 75..85 meV, above: 0.8 }
    - { block: 5..60 meV, below: 2e-2 }
    - { block: 110..200 meV, below: 2e-2, weight: 0.5 }
    # - { curve: goal.csv }      # energy_meV,T and, where wanted, sense,scale,tolerance,weight

growth:
  starts at: exit                # the side of the substrate; the sheets run from there up
  sources: { Ga: 0.70 ML/s, Al-1: 0.233 ML/s, Al-2: 0.377 ML/s }   # an element, or an element and a cell
  compositions: 1                # at most so many different alloys in one stack
  spread: { rate: 1 %, layer: 0.5 ML, x: 0.005 }                   # one standard deviation each
  trials: 2048

search: { effort: brief, seed: 1 }        # brief, standard or overnight
deliver: { candidates: 10 }
`
}

function ofLight(name: string): string {
  return `format: 1
name: ${name}            # also the folder under results/
kind: light
note: What the filter is for.
# angle: 10 deg                  # in the entry; polarisation: s, p or mean (half of each)
# conditions: { front: { angle: 0 deg }, tilted: { angle: 10 deg, polarisation: mean } }   # several at once; "at: tilted" ties a demand to one

# media:                         # your own, by numbers or by a table of wavelength_nm, n, k beside the job
#   film: { table: film.csv }
#   low: { index: 1.38, extinction: 0.0001 }

stack:                           # written from entry to exit, as the light meets it
  entry: air
  layers:
    # Quarter waves (qw) of the layer's own index at the reference, or nm; fixed, a range, or a range with a step.
    - repeat: 3
      period:
        - { id: H, material: Ta2O5, width: 1 qw }
        - { id: L, material: SiO2, width: 1 qw }
    - { like: H }
    - { id: cavity, material: SiO2, width: 1.9..2.1 qw step 0.01 qw }
    - { like: H }
    - { repeat: 3, period: [{ like: L }, { like: H }] }
    # - { repeat: 10, alike: false, period: [ ... ] }       # every repetition with widths of its own; 0: the layer is left out
    # - { material: { pick: [SiO2, MgF2] }, width: 20..200 nm }
  exit: N-BK7
  reference: 633 nm              # default: the middle of the scan
  # back: { thickness: 1 mm, then: air }    # the exit is a thick plate with this behind it

target:
  scan: 560..720 nm              # wavelengths in vacuum, or photon energies
  demands:
    - { peak: 633 nm, within: 2 nm, fwhm: 2..12 nm, height: 0.85 }
    # - { band: 633 nm, within: 2 nm, fwhm: 10..20 nm, top: 0.9, ripple: 0.2 }
    # - { pass: 620..640 nm, above: 0.9 }
    - { block: 580..615 nm, below: -10 dB }     # 0.1, -10 dB or OD 1
    - { block: 655..700 nm, below: -10 dB }
    # - { block: 620..640 nm, below: 0.01, quantity: R }    # of what is reflected; A: of what is absorbed
    # - { curve: goal.csv }      # wavelength_nm,T and, where wanted, sense,scale,tolerance,weight

growth:
  starts at: exit                # the side of the substrate; the sheets run from there up
  sources: { Ta2O5: 0.4 nm/s, SiO2: 0.8 nm/s }
  # thinnest: 8 nm               # of a layer that is there at all
  # total: ..6 um
  # tooling: { Ta2O5: 1.04 }     # thickness on the part over that on the monitor
  spread: { rate: 0.3 %, layer: 0.2 nm }    # one standard deviation each
  index: 0.001                   # of each medium
  trials: 2048

search: { effort: brief, seed: 1 }        # brief, standard or overnight
deliver: { candidates: 10 }
`
}
