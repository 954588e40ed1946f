import type { ModelDefinition } from '../../definition.ts';

export const methods: ModelDefinition['methods'] = {
  equations: String.raw`
Around a band crossing the electrons obey $H_\tau = \hbar v(\tau\sigma_x q_x + \sigma_y q_y) + m\sigma_z$ in the basis of the two sublattices (A, B), the same in both valleys ($\tau = 1$ for K, $-1$ for K′). A field $B$ along $+z$ replaces $q$ by $q + eA/\hbar$, and with the ladder operator $a$ and $w = \sqrt2\,\hbar v/l$, $l^2 = \hbar/(e|B|)$,

$$H_K = \begin{pmatrix} m & w a \\ w a^\dagger & -m \end{pmatrix},\qquad E_n = \operatorname{sgn}(n)\sqrt{m^2 + |n| w^2},\qquad E_0 = -\tau\operatorname{sgn}(B)\,m .$$

**Crossed field.** With a potential $Fx$ and $\beta = F l^2/(\hbar v)$ (the sign of $B$ in $l^2$), a boost gives, with $s = \sqrt{1-\beta^2}$,

$$E_n(k) = \operatorname{sgn}(n)\, s\sqrt{m^2 + |n|\,s\,w^2} - \beta\hbar v k .$$

The ladder closes as $(1-\beta^2)^{3/4}$ and is gone at $|\beta| = 1$, where $|F| = v|B|$.

**Two layers** (Bernal, B1 over A2), in the order A1, B1, A2, B2 with $\pi = \tau\pi_x + i\pi_y$:

$$H = \begin{pmatrix} U/2 & v\pi^\dagger & -v_4\pi^\dagger & v_3\pi \\ v\pi & U/2+\Delta & \gamma_1 & -v_4\pi^\dagger \\ -v_4\pi & \gamma_1 & -U/2+\Delta & v\pi^\dagger \\ v_3\pi^\dagger & -v_4\pi & v\pi & -U/2 \end{pmatrix}.$$

Layer 1 is at $+U/2$. Without $U$, $v_4$, $\Delta$ and $v_3$: $E^2 = \tfrac12\left(b \mp \sqrt{b^2-4c}\right)$ with $b = \gamma_1^2 + (2N+1)w^2$ and $c = w^4 N(N+1)$, and two zero modes. At low field this is $\hbar\omega_c\sqrt{N(N+1)}$ with $\hbar\omega_c = w^2/\gamma_1$.

**What the levels hold.** Each level has $e|B|/h$ states per area, valley and spin. The density of states is their sum with the chosen line shape; $n_e(E)$ counts electrons from neutrality, which is half of all listed levels over valleys and spins. The Fermi energy solves $n_e(E_F) = n_e$. Filling factors are $n_e h/(e|B|)$; sharp levels give plateaus $\sigma_{xy} = \nu e^2/h$ at $\nu = \pm2, \pm6, \pm10\ldots$ for one layer and $\pm4, \pm8\ldots$ for two.`,
  numerics: String.raw`
Three independent routes lead to the levels. The **closed form** is used where there is one; for two layers without $v_3$ it is the quartic of each $4\times4$ block, solved by Jacobi rotations. The **ladder** is the matrix in the oscillator basis, each component cut off at its own length so that the part with $v$ closes. With $v_3$ it falls into three chains ($n$ modulo 3), pentadiagonal with $v_4$ and tridiagonal without; levels are bisected by Sturm counts, so none is missed or invented, and the ladder is doubled until the levels stand still. The **grid** puts the two components half a step apart, which leaves no doubled levels; three grids are extrapolated in even powers of the step.

Every level carries an error: the half width of its proved interval plus what the longer ladder or the last extrapolation step changes. Levels with an error above 2 % of $w$, fields without levels, and Fermi energies outside the listed levels are left empty and marked.

Lorentzian lines at a temperature use the digamma function, Gaussian ones a Chebyshev table of their convolution with the Fermi function; Fermi energies are bracketed between levels and found to rounding. The certificate compares one field with an independent route.`,
  validity: `
The cone holds while energies are small against the hopping: for $t = 2.7$ eV the lattice differs by 1 % at 0.16 eV and by 5 % at 0.8 eV. The magnetic length must stay far above the bond length. Interactions, disorder beyond a line width, and screening of the bias are not in the model. The line widths are half widths (Lorentzian) and standard deviations (Gaussian), not full widths. A Lorentzian density depends on how many levels are listed, because its tails add up like the Dirac sea; say $n$ when you quote it.`,
  sources: [
    'J. W. McClure, Phys. Rev. 104, 666 (1956): levels of the cone.',
    'F. D. M. Haldane, PRL 61, 2015 (1988): the sign of the massive n = 0 level.',
    'V. P. Gusynin, S. G. Sharapov, PRL 95, 146801 (2005): half-integer Hall plateaus.',
    'V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007): crossed fields.',
    'E. McCann, V. I. Fal’ko, PRL 96, 086805 (2006); E. McCann, M. Koshino, Rep. Prog. Phys. 76, 056503 (2013): two layers.',
    'J. M. Pereira, F. M. Peeters, P. Vasilopoulos, PRB 76, 115419 (2007): four-band bilayer levels.',
  ],
  pitfalls: [
    'One cut-off for all components of the ladder leaves orphaned states near zero that look like levels.',
    'The sign of m in the n = 0 level depends on the basis: here (A, B) in both valleys, so for B > 0 it is −m in K and +m in K′.',
    'A co-located central difference shows every level twice; the staggered grid does not.',
    'U is +U/2 on layer 1; some papers use the opposite sign.',
    'The gap at zero field is 2|m|, not |m|.',
    'The Zeeman energy sees the whole field, the orbit only its normal part.',
  ],
};
