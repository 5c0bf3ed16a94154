/**
 * Colours that stay apart for every common kind of colour vision: they differ in lightness as well as in hue, and nothing is told by
 * colour alone (no-go regions are hatched, conditions dashed).
 */
export const palette = {
  ink: '#1d2733',
  quiet: '#5a6673',
  grid: '#e3e7ec',
  border: '#98a3af',
  /** T of the conditions, in their order; the dash goes with the colour. */
  curves: [
    { stroke: '#12467f', dash: undefined },
    { stroke: '#8a3f9c', dash: '7 3' },
    { stroke: '#a8780a', dash: '2 3' },
    { stroke: '#4a4a4a', dash: '9 3 2 3' },
  ],
  forbidden: '#b8431f',
  wanted: '#0f7f6f',
  edge: '#3d4954',
  solid: '#edf0f3',
  wave: '#12467f',
} as const
