/** A commented job of electrons to start from; readJob accepts it as it is. `name`: letters, digits, dashes. */
export function jobTemplate(name: string): string {
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
