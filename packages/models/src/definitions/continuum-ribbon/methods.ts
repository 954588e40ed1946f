import type { ModelDefinition } from '../../definition.ts';

export const methods: ModelDefinition['methods'] = {
  equations: String.raw`
Across a strip of width $W$ the two components obey $H_\tau = \hbar v(\tau\sigma_x q_x + \sigma_y q_y) + m\sigma_z + V$, with $V$, $m$, the strain gauge field $\mathcal A$ and the field $B$ functions of $u = y - W/2$. Along the strip the wave number $k$ is conserved. For zigzag, infinite-mass and periodic edges

$$E\phi_A = (V+m)\phi_A + \hbar v\,(Q - \partial_y)\phi_B,\qquad E\phi_B = (V-m)\phi_B + \hbar v\,(Q + \partial_y)\phi_A,$$

$$Q(u) = \tau\Big(k - \frac{e}{\hbar}\int_0^u B\,\mathrm du'\Big) + \mathcal A(u),$$

and $m$ stands for $m + \tau m_\tau$ with the valley-odd mass $m_\tau$.

**Zigzag**: $\phi_A(0) = 0$, $\phi_B(W) = 0$. Without field $\tau k\sin qW + q\cos qW = 0$; for $\tau kW \le -1$ the lowest level is the edge state $z\coth zW = -\tau k$, $E = \hbar v\, z/\sinh zW$.

**Armchair**: both components of $e^{iKx}\phi + e^{-iKx}\phi'$ vanish at both sides. Unfolding $\Phi(x) = \phi(x)$, $\Phi(-x) = -\phi'(x)$ gives one valley on a ring of length $2W$ with $\Phi(x+2W) = e^{-2iKW}\Phi(x)$, where $V$, $m$ and $B$ enter even and $\mathcal A$ and $m_\tau$ odd; the field counts $+$. Without field $q_n = n\pi/W - K$.

**Infinite mass** outside with sign $s$: $\phi_B/\phi_A = s$ below and $-s$ above. In $S, D = \phi_A \pm \phi_B$ momentum and mass change places. Opposite signs leave one mode $E = \pm\tau\hbar v k$.

**Periodic** with phase $\theta$, without profiles: $E = \pm\sqrt{m^2 + (\hbar v)^2 (k^2 + q^2)}$, $q = (2\pi n+\theta)/W$.`,
  numerics: String.raw`
The two components sit half a step apart, which leaves no doubled levels. Every edge gives a real tridiagonal chain, or a ring with one complex bond. Levels are counted by inertia: Sturm counts for eight energies at once on a chain; on a ring, folded to $2\times2$ blocks, the same with real arithmetic, and with chosen pivots where an elimination grows. Bisection on counts isolates the levels, twisted factorisations refine them and give their vectors, and two more counts prove every value. So the list between the proved ends is complete: no level is missed and none invented.

Three grids with $M$, $2M$ and $4M$ cells are extrapolated in $h^2$; levels are paired by their number counted from half filling. Where successive differences do not shrink by 3 to 5, the finest value stands with the last difference as its error. The extrapolated value decides whether a level lies in the window.

$\mathrm dE/\mathrm dk$ is the expectation value of $\mathrm dH/\mathrm dk$; levels closer than a thousand times their proved width form a cluster, in which it is diagonalised and densities are averaged. Band edges are found where $\mathrm dE/\mathrm dk$ changes sign, by solving there, not read off the axis. Channels count rising crossings of every band; an energy is marked as proved only inside the proved range at every $k$, away from places where a pair of crossings could hide, and if nothing crosses it beyond the ends of the axis.

Steps in a profile enter as exact means over a site's cell or a bond, other kinds by their values there; a field profile is integrated exactly. Densities are $|\phi_A|^2$ and $|\phi_B|^2$ at all sites of the finest grid, the component that does not live there as the mean of its neighbours, normalised to 1 over the strip.`,
  validity: String.raw`
The cone holds while energies are small against the hopping (1 % at 0.16 eV and 5 % at 0.8 eV for $t = 2.7$ eV) and while width, magnetic length and all profiles are long against the bond. Edges are ideal: smooth on the scale of a bond they are not, and real ones mix valleys. An armchair width is $(N+1)\sqrt3 a_0/2$; a zigzag ribbon of $N$ chains is matched best by $(3N/2 + 3/4)\,a_0$. Gauge fields from strain are first order. Electrons do not interact. Channels count modes of an ideal strip.`,
  sources: [
    'L. Brey, H. A. Fertig, PRB 73, 235411 (2006) and PRB 73, 195408 (2006): edges of the continuum ribbon, without and in a field.',
    'M. V. Berry, R. J. Mondragon, Proc. R. Soc. A 412, 53 (1987): infinite-mass walls.',
    'R. Stacey, Phys. Rev. D 26, 468 (1982); L. Susskind, Phys. Rev. D 16, 3031 (1977): staggered grids.',
    'W. Barth, R. S. Martin, J. H. Wilkinson, Numer. Math. 9, 386 (1967): bisection on Sturm counts.',
    'K. V. Fernando, SIAM J. Matrix Anal. 18, 1013 (1997); B. N. Parlett, I. S. Dhillon, Linear Algebra Appl. 267, 247 (1997): twisted factorisations.',
    'J. R. Bunch, L. Kaufman, Math. Comp. 31, 163 (1977): pivots for symmetric elimination.',
    'V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007): crossed fields.',
  ],
  pitfalls: [
    'The strain gauge field has opposite signs in the two valleys, a real vector potential the same: under the armchair unfolding one is odd and the other even.',
    'A width from atom to atom, (N − 1)a/2, puts armchair ribbons into the wrong family.',
    'A zigzag grid has the step W/(M + ½), not W/M.',
    'A wall of finite mass approaches the infinite one only as 1/mass.',
    'An even number of wave numbers misses k = 0 and shows a gap in a metallic ribbon.',
    'Splittings of zigzag edge states below the error bound are upper limits, not digits.',
    'Levels of the two valleys of an armchair ribbon are one list: colours mean something only where the share of K is far from one half.',
  ],
};
