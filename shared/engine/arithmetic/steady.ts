/**
 * exp and powers in doubles by additions, products and quotients alone, which IEEE 754 fixes to the last bit, while the built-in exp may differ
 * from one JavaScript engine to the next. For choices that a repetition must make alike without finding them in the certificate;
 * accurate to a few units of the twelfth digit, and never part of a bound.
 */

const LN2 = 0.6931471805599453

/** About e^x for |x| < 700, 0 below. */
export function steadyExp(x: number): number {
  if (x < -700) return 0
  const n = Math.floor(x / LN2 + 0.5)
  const r = (x - n * LN2) / 16
  let [term, sum] = [1, 1]
  for (let i = 1; i <= 12; i++) {
    term *= r / i
    sum += term
  }
  for (let i = 0; i < 4; i++) sum *= sum
  for (let i = 0; i < n; i++) sum *= 2
  for (let i = 0; i > n; i--) sum /= 2
  return sum
}

/** About log v for v > 0. */
export function steadyLog(v: number): number {
  let [m, e] = [v, 0]
  for (; m >= 1.5; e++) m /= 2
  for (; m < 0.75; e--) m *= 2
  const s = (m - 1) / (m + 1)
  let [power, sum] = [s, s]
  for (let i = 3; i <= 41; i += 2) {
    power *= s * s
    sum += power / i
  }
  return 2 * sum + e * LN2
}
