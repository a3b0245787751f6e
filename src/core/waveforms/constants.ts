/** GM☉ in m³/s² (IAU 2015 resolution B3, READ). */
const GM_SUN = 1.3271244e20;
/** m/s, exact. */
const LIGHT = 299_792_458;
/** m (IAU 2015 resolution B2 and the definition of the parsec, READ). */
const MPC = 3.085677581491367e22;

/** GM☉/c³ in s. */
export const SUN_SECONDS = GM_SUN / LIGHT ** 3;
/** A megaparsec in light-seconds. */
export const MPC_SECONDS = MPC / LIGHT;
/** Euler's γ. */
export const EULER_GAMMA = 0.5772156649015329;
/** For `explain` of numbers that rest on these. */
export const CONSTANTS_SOURCE = 'GM☉ = 1.3271244e20 m³/s² (IAU 2015 B3, READ), c exact';
