/**
 * Units inside the kernel: eV, nm, T, 1/nm, K, rad. Constants from the exact SI values
 * h = 6.62607015e-34 J s, e = 1.602176634e-19 C, k_B = 1.380649e-23 J/K (BIPM, SI Brochure, 9th ed., 2019).
 */

/** ħ/e in T nm²: ħ/e · 10¹⁸. The magnetic length is √(ħ/(e|B|)). */
export const HBAR_OVER_E: f64 = 658.2119569509067;
/** h/e in T nm², the flux quantum: B/this is the degeneracy per area, spin and valley. */
export const FLUX_QUANTUM: f64 = 4135.667696923859;
/** μ_B in eV/T (CODATA 2022: 9.2740100657e-24 J/T). */
export const BOHR_MAGNETON: f64 = 5.7883817982e-5;
/** k_B in eV/K: 1.380649e-23 / 1.602176634e-19. */
export const BOLTZMANN: f64 = 8.617333262145179e-5;
/** Unit roundoff of a double times two: 2⁻⁵². */
export const EPSILON: f64 = 2.220446049250313e-16;
