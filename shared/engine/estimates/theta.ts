import { multiply, parseRational, rational, toText } from '../arithmetic/rational.ts'
import { type Estimate, type Point, negated, sum, term, twoSided } from './estimate.ts'

/** How a statement came here, in the words shown to a reader. */
const TRANSCRIBED = "statement taken from a formal transcription of the paper; the paper's own text not seen"
const RECALLED = 'source text not seen'
const checkedTo8 = (origin: string) => `Numerically true on both sides of every prime up to 10^8 within its range; ${origin}.`
const outOfReach = (origin: string) => `Begins beyond the reach of a numerical check; ${origin}.`

const DUSART_2018 = 'P. Dusart, Explicit estimates of some functions over primes, Ramanujan J. 45 (2018) 227-251'
const BKLNW_2021 =
  'S. Broadbent, H. Kadiri, A. Lumley, N. Ng, K. Wilk, Sharper bounds for the Chebyshev function theta(x), Math. Comp. 90 (2021) 2281-2315, arXiv:2002.11068'
const BUTHE_2018 = 'J. Buthe, An analytic method for bounding psi(x), Math. Comp. 87 (2018) 1991-2009, arXiv:1511.02032'

const logText = (k: number) => (k === 1 ? 'log x' : `log^${k} x`)
const logLatex = (k: number) => (k === 1 ? '\\log x' : `\\log^{${k}} x`)
/** A number written as 1.5e-9 for people, as a product for LaTeX. */
const latexNumber = (text: string) => text.replace(/e(-?\d+)$/, (_, exponent: string) => `\\cdot 10^{${exponent}}`)

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

/**
 * Table 15: |theta(x) - x| <= M_k x / log^k x for log x >= b. Its entries are rounded to nearest, so each is used a little
 * larger, by a factor 1.003.
 */
const BKLNW_ROWS: [from: Point, label: string, ...m: string[]][] = [
  [{ x: '1000000' }, '10^6', '2.3240e-2', '3.2309e-1', '4.4916', '62.444', '1.3441e5'],
  [{ x: '100000000' }, '10^8', '2.7457e-3', '5.0612e-2', '9.4259e-1', '57.184'],
  [{ x: '1000000000' }, '10^9', '9.5913e-4', '2.0087e-2', '4.2065e-1'],
  [{ x: '10000000000' }, '10^10', '3.7787e-4', '8.7526e-3', '2.0274e-1'],
  [{ x: '19035709163' }, '19035709163', '2.6773e-4', '6.3370e-3', '1.5000e-1'],
  [{ x: '100000000000' }, '10^11', '1.3392e-4', '3.4053e-3', '8.6589e-2'],
  [{ log: '28' }, 'e^28', '4.3555e-5', '1.2196e-3', '3.4148e-2'],
  [{ log: '30' }, 'e^30', '1.7139e-5', '5.1415e-4', '2.4334e-2'],
  [{ log: '35' }, 'e^35', '1.7078e-6', '5.9771e-5'],
  [{ x: '10000000000000000000' }, '10^19', '8.6315e-7', '3.7979e-5', '2.4334e-2'],
  [{ log: '45' }, 'e^45', '5.0646e-7', '2.3298e-5'],
  [{ log: '50' }, 'e^50', '5.7545e-8', '1.0376e-5'],
  [{ log: '55' }, 'e^55', '6.3417e-9'],
  [{ log: '60' }, 'e^60', '4.4627e-9', '1.0376e-5'],
  [{ log: '3000' }, 'e^3000', '1.3915e-10', '4.2091e-7', '1.2733e-3', '3.8516', '1.1651e4'],
]

const larger = (entry: string) => toText(multiply(parseRational(entry)!, rational(1003, 1000)))

function bklnwEntry(from: Point, label: string, m: string, k: number): Estimate {
  const withinReach = label === '10^6' || label === '10^8'
  return {
    id: `theta-bklnw-2021-${'log' in from ? `e${from.log}` : from.x}-k${k}`,
    title: `Broadbent et al. 2021, Table 15, k = ${k}, x >= ${label}`,
    statement: `|theta(x) - x| <= 1.003 * ${m} x / ${logText(k)}`,
    statementLatex: `|\\theta(x)-x| \\le 1.003\\cdot ${latexNumber(m)}\\,\\frac{x}{${logLatex(k)}}`,
    validFor: `x >= ${label}`,
    conditional: false,
    condition: null,
    source: `${BKLNW_2021}, Theorem 1b and Table 15; the table's entry, rounded to nearest there, is multiplied by 1.003`,
    checked: withinReach ? checkedTo8(TRANSCRIBED) : outOfReach(TRANSCRIBED),
    claim: { quantity: 'theta', from, to: null, ...twoSided(sum(term(larger(m), '1', String(-k)))) },
  }
}

const SINGLE: Estimate[] = [
  {
    id: 'theta-buthe-2018-b',
    title: 'Buthe 2018, theta not far below x',
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
    title: 'Buthe 2018, theta below x',
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
      'D. R. Johnston, Improving bounds on prime counting functions by partial verification of the Riemann hypothesis, Ramanujan J. 59 (2022) 1307-1321, with J. Buthe, Math. Comp. 85 (2016) 2483-2498, Theorem 2, and D. Platt, T. Trudgian, The Riemann hypothesis is true up to 3*10^12, Bull. London Math. Soc. 53 (2021) 792-797',
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
    claim: { quantity: 'theta', from: { x: '2' }, to: null, ...twoSided({ form: 'decay', coefficient: '121.0961', r: '5.5666305', logPower: '3/2', rate: '2' }) },
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
  ...BKLNW_ROWS.flatMap(([from, label, ...entries]) => entries.map((m, i) => bklnwEntry(from, label, m, i + 1))),
]
