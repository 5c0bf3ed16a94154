/**
 * Physical constants, CODATA 2022 (P. Mohr, D. Newell, B. Taylor, E. Tiesinga, arXiv:2409.03787).
 * h, e, c and k_B are exact by the definition of the SI; m_e is measured, 9.1093837139(28)e-31 kg.
 * Derived numbers are the nearest doubles of their 50-digit values.
 */

/** J s, exact. */
export const planckJs = 6.62607015e-34

/** C, exact. */
export const elementaryChargeC = 1.602176634e-19

/** m/s, exact. */
export const lightSpeedMPerS = 299792458

/** J/K, exact. */
export const boltzmannJPerK = 1.380649e-23

/** kg. The value of 2018, 9.1093837015e-31, differs by 1.4e-9. */
export const electronMassKg = 9.1093837139e-31

/** hbar²/(2 m_e) in eV nm²: k² = massRel (E - V) / hbar2Over2m0. */
export const hbar2Over2m0 = 0.038099821109685836

/** h c in eV nm, exact: photon energy times vacuum wavelength. */
export const hcEvNm = 1239.8419843320025

/** hbar in eV fs. */
export const hbarEvFs = 0.6582119569509066

/** eV/K. */
export const boltzmannEvPerK = 8.617333262145177e-5

/** 2e²/h in S: the conductance of one open channel with both spins. */
export const conductanceQuantumS = 7.74809172986365e-5
