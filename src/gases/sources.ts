/** Sources that several gases share, so that each is spelt once. */

export const WARD = 'Ward, Calculations of cathode-fall characteristics, J. Appl. Phys. 33, 2789, 1962';
export const RAIZER = 'Raizer, Gas Discharge Physics, 1991, Table 4.1';
export const LIEBERMAN = 'Lieberman and Lichtenberg, Principles of Plasma Discharges, 2nd ed., 2005, Table 14.1';
export const ELLIS = 'Ellis et al., At. Data Nucl. Data Tables 17, 177, 1976 and 22, 179, 1978';
export const WANNIER = 'Wannier 1953: W = sqrt(2 e E λ/(π M)), λ = 1/(N Q)';
/** what test/gases computes, and repeats on every run of the tests */
export const TWO_TERM =
  'our own two-term solution of the Boltzmann equation for a stream that grows along the field (test/gases/two-term.ts), with cross-sections recalled from the sets in common use (test/gases/cross-sections.ts)';
