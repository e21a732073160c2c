import { type Estimate, RECALLED, TRANSCRIBED, checkedTo8, negated, outOfReach, sum, term, twoSided } from './estimate.ts'
import { BKLNW_2021, THETA_TABLE, logLatex, logText } from './theta-table.ts'

const DUSART_2018 = 'P. Dusart, Explicit estimates of some functions over primes, Ramanujan J. 45 (2018) 227-251'
const BUTHE_2018 = 'J. Büthe, An analytic method for bounding psi(x), Math. Comp. 87 (2018) 1991-2009, arXiv:1511.02032'

/** |theta(x) - x| < eta x / log^k x for x >= from: Theorem 4.2, row by row. */
function dusartRow(k: number, eta: string, from: string): Estimate {
  const shape = k === 0 ? 'x' : `x / ${logText(k)}`
  return {
    id: `theta-dusart-2018-k${k}-${from}`,
    title: `Dusart 2018, k = ${k}, x >= ${from}`,
    statement: `|theta(x) - x| < ${eta} ${shape}`,
    statementLatex: k === 0 ? `|\\theta(x)-x| < ${eta}\\,x` : `|\\theta(x)-x| < ${eta}\\,\\frac{x}{${logLatex(k)}}`,
    validFor: `x >= ${from}`,
    conditional: false,
    condition: null,
    source: `${DUSART_2018}, Theorem 4.2`,
    checked: Number(from) > 1e8 ? outOfReach(TRANSCRIBED) : checkedTo8(TRANSCRIBED),
    claim: { quantity: 'theta', from: { x: from }, to: null, ...twoSided(sum(term(eta, '1', String(-k)))) },
  }
}

const DUSART_ROWS: [k: number, eta: string, from: string][] = [
  [1, '1.2323', '2'], [1, '0.001', '908994923'],
  [2, '3.965', '2'], [2, '0.2', '3594641'], [2, '0.05', '122568683'], [2, '0.01', '7713133853'],
  [3, '20.83', '2'], [3, '10', '32321'], [3, '1', '89967803'], [3, '0.78', '158822621'], [3, '0.5', '767135587'],
  [4, '151.3', '2'],
]

const SINGLE: Estimate[] = [
  {
    id: 'theta-buthe-2018-b',
    title: 'Büthe 2018, theta not far below x',
    statement: 'x - theta(x) <= 1.95 sqrt(x)',
    statementLatex: 'x-\\theta(x)\\le 1.95\\sqrt{x}',
    validFor: '1427 <= x <= 10^19',
    conditional: false,
    condition: null,
    source: `${BUTHE_2018}, Theorem 2(b)`,
    checked: `${checkedTo8(TRANSCRIBED)} The transcription begins the range at 1423, where the bound fails on (1426.47, 1427); used from 1427 on.`,
    claim: { quantity: 'theta', from: { x: '1427' }, to: { x: '10000000000000000000' }, lower: sum(term('-1.95', '1/2', '0')) },
  },
  {
    id: 'theta-buthe-2018-c',
    title: 'Büthe 2018, theta below x',
    statement: 'x - theta(x) > 0.05 sqrt(x)',
    statementLatex: 'x-\\theta(x) > 0.05\\sqrt{x}',
    validFor: '1 <= x <= 10^19',
    conditional: false,
    condition: null,
    source: `${BUTHE_2018}, Theorem 2(c)`,
    checked: checkedTo8(TRANSCRIBED),
    claim: { quantity: 'theta', from: { x: '1' }, to: { x: '10000000000000000000' }, upper: sum(term('-0.05', '1/2', '0')) },
  },
  {
    id: 'theta-johnston-2022',
    title: 'Johnston 2022, from the verification of the Riemann hypothesis to height 3 * 10^12',
    statement: '|theta(x) - x| <= sqrt(x) log^2 x / (8 pi)',
    statementLatex: '|\\theta(x)-x|\\le\\frac{\\sqrt{x}\\,\\log^2 x}{8\\pi}',
    validFor: '599 < x <= 1.101 * 10^26',
    conditional: false,
    condition: null,
    source:
      'D. R. Johnston, Improving bounds on prime counting functions by partial verification of the Riemann hypothesis, Ramanujan J. 59 (2022) 1307-1321, with J. Büthe, Math. Comp. 85 (2016) 2483-2498, Theorem 2, and D. Platt, T. Trudgian, The Riemann hypothesis is true up to 3*10^12, Bull. London Math. Soc. 53 (2021) 792-797',
    checked: checkedTo8("the introduction of the first paper was seen, the range for theta follows from its condition (9.06/log log x) sqrt(x/log x) <= 3*10^12"),
    claim: { quantity: 'theta', from: { x: '599' }, to: { x: '110100000000000000000000000' }, ...twoSided(sum({ ...term('1/8', '1/2', '2'), overPi: true })) },
  },
  {
    id: 'theta-schoenfeld-1976-rh',
    title: 'Schoenfeld 1976, under the Riemann hypothesis',
    statement: '|theta(x) - x| < sqrt(x) log^2 x / (8 pi)',
    statementLatex: '|\\theta(x)-x|<\\frac{\\sqrt{x}\\,\\log^2 x}{8\\pi}',
    validFor: 'x >= 599',
    conditional: true,
    condition: 'the Riemann hypothesis',
    source: 'L. Schoenfeld, Sharper bounds for the Chebyshev functions theta(x) and psi(x) II, Math. Comp. 30 (1976) 337-360, Theorem 10',
    checked: checkedTo8('statement seen quoted in the introduction of a later paper'),
    claim: { quantity: 'theta', from: { x: '599' }, to: null, ...twoSided(sum({ ...term('1/8', '1/2', '2'), overPi: true })) },
  },
  {
    id: 'theta-bklnw-2021-cor-2.1',
    title: 'Broadbent et al. 2021, an upper bound for all x',
    statement: 'theta(x) <= (1 + 1.93378e-8) x',
    statementLatex: '\\theta(x)\\le(1+1.93378\\cdot10^{-8})\\,x',
    validFor: 'x > 0',
    conditional: false,
    condition: null,
    source: `${BKLNW_2021}, Corollary 2.1`,
    checked: checkedTo8(TRANSCRIBED),
    claim: { quantity: 'theta', from: { x: '1' }, to: null, upper: sum(term('1.93378e-8', '1', '0')) },
  },
  {
    id: 'theta-fiori-2023-cor-14',
    title: 'Fiori, Kadiri, Swidinsky 2023, for all x',
    statement: '|theta(x) - x| <= 121.0961 x (log x / R)^(3/2) exp(-2 sqrt(log x / R)), R = 5.5666305',
    statementLatex: '|\\theta(x)-x|\\le 121.0961\\,x\\left(\\tfrac{\\log x}{R}\\right)^{3/2}e^{-2\\sqrt{\\log x/R}},\\quad R=5.5666305',
    validFor: 'x >= 2',
    conditional: false,
    condition: null,
    source: 'A. Fiori, H. Kadiri, J. Swidinsky, Sharper bounds for the error term in the prime number theorem, Res. Number Theory 9 (2023) no. 63, arXiv:2206.12557, Corollary 14',
    checked: checkedTo8(TRANSCRIBED),
    claim: { quantity: 'theta', from: { x: '2' }, to: null, ...twoSided({ form: 'decay', coefficient: '121.0961', logPower: '3/2', base: '5.5666305', rate: '2', r: '5.5666305' }) },
  },
  {
    id: 'theta-trudgian-2016-lemma-1',
    title: 'Trudgian 2016, Lemma 1',
    statement: '|theta(x) - x| <= 0.0045 x / log^2 x',
    statementLatex: '|\\theta(x)-x|\\le 0.0045\\,\\frac{x}{\\log^2 x}',
    validFor: 'x >= e^35',
    conditional: false,
    condition: null,
    source: 'T. Trudgian, Updating the error term in the prime number theorem, Ramanujan J. 39 (2016) 225-234, arXiv:1401.2689, Lemma 1',
    checked: outOfReach(TRANSCRIBED),
    claim: { quantity: 'theta', from: { log: '35' }, to: null, ...twoSided(sum(term('0.0045', '1', '-2'))) },
  },
  {
    id: 'theta-axler-2018',
    title: 'Axler 2018',
    statement: '|theta(x) - x| < 0.15 x / log^3 x',
    statementLatex: '|\\theta(x)-x|<0.15\\,\\frac{x}{\\log^3 x}',
    validFor: 'x >= 19035709163',
    conditional: false,
    condition: null,
    source: 'C. Axler, New estimates for some functions defined over primes, Integers 18 (2018) A52',
    checked: outOfReach(RECALLED),
    claim: { quantity: 'theta', from: { x: '19035709163' }, to: null, ...twoSided(sum(term('0.15', '1', '-3'))) },
  },
  {
    id: 'theta-rosser-schoenfeld-1962-thm-4',
    title: 'Rosser, Schoenfeld 1962, Theorem 4',
    statement: 'x (1 - 1/(2 log x)) < theta(x) < x (1 + 1/(2 log x))',
    statementLatex: 'x\\Bigl(1-\\frac1{2\\log x}\\Bigr)<\\theta(x)<x\\Bigl(1+\\frac1{2\\log x}\\Bigr)',
    validFor: 'x >= 563',
    conditional: false,
    condition: null,
    source: 'J. B. Rosser, L. Schoenfeld, Approximate formulas for some functions of prime numbers, Illinois J. Math. 6 (1962) 64-94, Theorem 4',
    checked: checkedTo8(RECALLED),
    claim: { quantity: 'theta', from: { x: '563' }, to: null, ...twoSided(sum(term('1/2', '1', '-1'))) },
  },
  {
    id: 'theta-schoenfeld-1976-upper',
    title: 'Schoenfeld 1976, an upper bound for all x',
    statement: 'theta(x) < 1.000081 x',
    statementLatex: '\\theta(x)<1.000081\\,x',
    validFor: 'x > 0',
    conditional: false,
    condition: null,
    source: 'L. Schoenfeld, Sharper bounds for the Chebyshev functions theta(x) and psi(x) II, Math. Comp. 30 (1976) 337-360',
    checked: checkedTo8('statement seen quoted in a later paper'),
    claim: { quantity: 'theta', from: { x: '1' }, to: null, upper: sum(term('0.000081', '1', '0')) },
  },
  {
    id: 'theta-schoenfeld-1976-lower',
    title: 'Schoenfeld 1976, a lower bound',
    statement: '0.998684 x < theta(x)',
    statementLatex: '0.998684\\,x<\\theta(x)',
    validFor: 'x >= 1319007',
    conditional: false,
    condition: null,
    source: 'L. Schoenfeld, Sharper bounds for the Chebyshev functions theta(x) and psi(x) II, Math. Comp. 30 (1976) 337-360',
    checked: checkedTo8(RECALLED),
    claim: { quantity: 'theta', from: { x: '1319007' }, to: null, lower: negated(sum(term('0.001316', '1', '0'))) },
  },
]

/** Estimates of theta(x) = sum of log p over the primes p <= x: the ones that the tails of partial sums use. */
export const THETA_ESTIMATES: readonly Estimate[] = [
  ...SINGLE,
  ...DUSART_ROWS.map((row) => dusartRow(...row)),
  ...THETA_TABLE,
]
