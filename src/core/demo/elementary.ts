/**
 * Elementary functions built from + − × ÷ and √ alone, which IEEE 754 fixes to the last bit. `Math.sin`, `Math.exp` and
 * their kin may differ in the last digit between engines and versions; the demo's samples must not.
 * Error: below 2 units in the last place for `log` away from 1 and for `exp` with |x| < 1; see the tests.
 */

const bits = new DataView(new ArrayBuffer(8));

/** ln 2 in two parts; the first has 32 bits, so that an exponent times it is exact. */
const LN2_HIGH = 2977044471 / 4294967296;
const LN2_LOW = 1.9082149292705877e-10;
const SQRT2 = 1.4142135623730951;

/** Natural logarithm of a normal positive number: 2 artanh((m−1)/(m+1)) for the mantissa m in [√½, √2). Throws otherwise. */
export function log(x: number): number {
  if (!(x >= 2.2250738585072014e-308 && x < Infinity))
    throw new RangeError(`log of ${x} is not defined here: a normal positive number is needed`);
  bits.setFloat64(0, x);
  const high = bits.getUint32(0);
  let exponent = (high >>> 20) - 1023;
  bits.setUint32(0, (high & 0xfffff) | 0x3ff00000);
  let m = bits.getFloat64(0);
  if (m > SQRT2) {
    m *= 0.5;
    exponent += 1;
  }
  const s = (m - 1) / (m + 1);
  const z = s * s;
  let sum = 1 / 23;
  for (let odd = 21; odd >= 3; odd -= 2) sum = sum * z + 1 / odd;
  return exponent * LN2_HIGH + (2 * s + (2 * s * z * sum + exponent * LN2_LOW));
}

/** Exponential by reduction to |r| ≤ ln 2 / 2 and the Taylor sum to r¹⁴. Throws beyond ±700. */
export function exp(x: number): number {
  if (!(x > -700 && x < 700)) throw new RangeError(`exp of ${x} is out of range: −700 to 700`);
  const k = Math.floor(x / 0.6931471805599453 + 0.5);
  const r = x - k * LN2_HIGH - k * LN2_LOW;
  let sum = 1;
  for (let n = 14; n >= 1; n--) sum = 1 + (r / n) * sum;
  bits.setFloat64(0, 1);
  bits.setUint32(0, (k + 1023) << 20);
  return sum * bits.getFloat64(0);
}

/** x to the power y for x > 0. */
export function power(x: number, y: number): number {
  return exp(y * log(x));
}

/** Taylor sums on |x| ≤ π/4. */
function sinSmall(x: number): number {
  const z = x * x;
  let sum = 1;
  for (let n = 18; n >= 2; n -= 2) sum = 1 - (z / (n * (n + 1))) * sum;
  return x * sum;
}
function cosSmall(x: number): number {
  const z = x * x;
  let sum = 1;
  for (let n = 17; n >= 1; n -= 2) sum = 1 - (z / (n * (n + 1))) * sum;
  return sum;
}

/**
 * Cosine of an angle given in turns (1 turn = 2π). Angles in turns reduce exactly, so cos and sin of multiples of a
 * quarter are exactly 0 or ±1 and large phases lose nothing beyond their own last digit.
 */
export function cosTurns(t: number): number {
  const r = t - Math.floor(t + 0.5);
  const quarter = Math.floor(r * 4 + 0.5);
  const x = (r - quarter * 0.25) * 6.283185307179586;
  switch (quarter & 3) {
    case 0:
      return cosSmall(x);
    case 1:
      return -sinSmall(x);
    case 2:
      return -cosSmall(x);
    default:
      return sinSmall(x);
  }
}

/** Sine of an angle given in turns. */
export function sinTurns(t: number): number {
  return cosTurns(t - 0.25);
}
