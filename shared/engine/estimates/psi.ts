import { type Estimate, RECALLED, TRANSCRIBED, checkedTo8, sum, term, twoSided, underRiemannHypothesis, unconditional } from './estimate.ts'

const ROOT_LOG_SQUARED = { ...term('1/8', '1/2', '2'), overPi: true as const }

/** |psi(x) - x| < eta x / log^k x for all x >= 2: Theorem 3.3. */
const DUSART_ROWS: [k: number, eta: string][] = [[1, '0.85'], [2, '1.66'], [3, '8.16'], [4, '59.18']]

/** Estimates of psi(x), the sum of log p over the prime powers up to x. */
export const PSI_ESTIMATES: readonly Estimate[] = [
  unconditional(
    'psi-buthe-2018-a',
    'Büthe 2018',
    ['|psi(x) - x| <= 0.94 sqrt(x)', '|\\psi(x)-x|\\le 0.94\\sqrt{x}'],
    '11 < x <= 10^19',
    'J. Büthe, An analytic method for bounding psi(x), Math. Comp. 87 (2018) 1991-2009, arXiv:1511.02032, Theorem 2(a)',
    checkedTo8('the abstract with this statement was seen'),
    { quantity: 'psi', from: { x: '11' }, to: { x: '10000000000000000000' }, ...twoSided(sum(term('0.94', '1/2', '0'))) },
  ),
  unconditional(
    'psi-rosser-schoenfeld-1962-thm-12',
    'Rosser, Schoenfeld 1962, Theorem 12',
    ['psi(x) < 1.03883 x', '\\psi(x)<1.03883\\,x'],
    'x > 0',
    'J. B. Rosser, L. Schoenfeld, Approximate formulas for some functions of prime numbers, Illinois J. Math. 6 (1962) 64-94, Theorem 12',
    checkedTo8(TRANSCRIBED),
    { quantity: 'psi', from: { x: '1' }, to: null, upper: sum(term('0.03883', '1', '0')) },
  ),
  ...DUSART_ROWS.map(([k, eta]) =>
    unconditional(
      `psi-dusart-2018-k${k}`,
      `Dusart 2018, Theorem 3.3, k = ${k}`,
      [`|psi(x) - x| < ${eta} x / log^${k} x`, `|\\psi(x)-x|<${eta}\\,\\frac{x}{\\log^{${k}}x}`],
      'x >= 2',
      'P. Dusart, Explicit estimates of some functions over primes, Ramanujan J. 45 (2018) 227-251, Theorem 3.3',
      checkedTo8(TRANSCRIBED),
      { quantity: 'psi', from: { x: '2' }, to: null, ...twoSided(sum(term(eta, '1', String(-k)))) },
    ),
  ),
  unconditional(
    'psi-johnston-yang-2023-thm-1.1',
    'Johnston, Yang 2023, Theorem 1.1',
    ['|psi(x) - x| <= 9.39 x log^1.515 x exp(-0.8274 sqrt(log x))', '|\\psi(x)-x|\\le 9.39\\,x\\,(\\log x)^{1.515}e^{-0.8274\\sqrt{\\log x}}'],
    'x >= 2',
    'D. R. Johnston, A. Yang, Some explicit estimates for the error term in the prime number theorem, J. Math. Anal. Appl. 527 (2023) 127460, Theorem 1.1',
    checkedTo8(TRANSCRIBED),
    { quantity: 'psi', from: { x: '2' }, to: null, ...twoSided({ form: 'decay', coefficient: '9.39', logPower: '1.515', base: '1', rate: '0.8274', r: '1' }) },
  ),
  unconditional(
    'psi-fiori-2023-cor-1.4',
    'Fiori, Kadiri, Swidinsky 2023, Corollary 1.4',
    ['|psi(x) - x| <= 9.22022 x log^(3/2) x exp(-0.8476836 sqrt(log x))', '|\\psi(x)-x|\\le 9.22022\\,x\\,(\\log x)^{3/2}e^{-0.8476836\\sqrt{\\log x}}'],
    'x > 2',
    'A. Fiori, H. Kadiri, J. Swidinsky, Sharper bounds for the Chebyshev function psi(x), J. Math. Anal. Appl. 527 (2023) 127426, Corollary 1.4',
    checkedTo8(TRANSCRIBED),
    { quantity: 'psi', from: { x: '2' }, to: null, ...twoSided({ form: 'decay', coefficient: '9.22022', logPower: '3/2', base: '1', rate: '0.8476836', r: '1' }) },
  ),
  unconditional(
    'psi-johnston-2022',
    'Johnston 2022, from the verification of the Riemann hypothesis to height 3 * 10^12',
    ['|psi(x) - x| <= sqrt(x) log^2 x / (8 pi)', '|\\psi(x)-x|\\le\\frac{\\sqrt{x}\\,\\log^2 x}{8\\pi}'],
    '59 < x <= 1.101 * 10^26',
    'D. R. Johnston, Improving bounds on prime counting functions by partial verification of the Riemann hypothesis, Ramanujan J. 59 (2022) 1307-1321, with J. Büthe, Math. Comp. 85 (2016) 2483-2498, Theorem 2',
    checkedTo8('the introduction of the first paper was seen, the range for psi follows from its condition'),
    { quantity: 'psi', from: { x: '59' }, to: { x: '110100000000000000000000000' }, ...twoSided(sum(ROOT_LOG_SQUARED)) },
  ),
  underRiemannHypothesis(
    'psi-schoenfeld-1976-rh',
    'Schoenfeld 1976, under the Riemann hypothesis',
    ['|psi(x) - x| < sqrt(x) log^2 x / (8 pi)', '|\\psi(x)-x|<\\frac{\\sqrt{x}\\,\\log^2 x}{8\\pi}'],
    'x >= 73.2',
    'L. Schoenfeld, Sharper bounds for the Chebyshev functions theta(x) and psi(x) II, Math. Comp. 30 (1976) 337-360, Theorem 10',
    checkedTo8(RECALLED),
    { quantity: 'psi', from: { x: '73.2' }, to: null, ...twoSided(sum(ROOT_LOG_SQUARED)) },
  ),
]
