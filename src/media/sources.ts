/**
 * Where the numbers of this folder come from. The tables of the review were read in public copies that name it, never in
 * the paper itself; each number says how many copies agree.
 */

const review = 'Vurgaftman, Meyer, Ram-Mohan, J. Appl. Phys. 89, 5815 (2001)'

/** Two or more independent public copies that name the paper agree. */
export const twoCopies = `${review}; two public copies agree`

/** One public copy that names the paper, and memory. */
export const oneCopy = `${review}; one public copy`

export const fromMemory = `${review}; from memory`

/** The review tabulates the elastic constants of these crystals with a factor of 10 (1221 for GaAs); only c12/c11 matters here. */
export const elasticCopies = `${twoCopies}; printed there as ten times the value, unit of that table from memory`
