import { multiply, parseRational, rational, toText } from '../arithmetic/rational.ts'
import { type Estimate, type Point, TRANSCRIBED, checkedTo8, outOfReach, sum, term, twoSided } from './estimate.ts'

export const BKLNW_2021 =
  'S. Broadbent, H. Kadiri, A. Lumley, N. Ng, K. Wilk, Sharper bounds for the Chebyshev function theta(x), Math. Comp. 90 (2021) 2281-2315, arXiv:2002.11068'

export const logText = (k: number) => (k === 1 ? 'log x' : `log^${k} x`)
export const logLatex = (k: number) => (k === 1 ? '\\log x' : `\\log^{${k}} x`)
/** A number written as 1.5e-9 for people, as a product for LaTeX. */
const latexNumber = (text: string) => text.replace(/e(-?\d+)$/, (_, exponent: string) => `\\cdot 10^{${exponent}}`)

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
  const withinReach = label === '10^6'
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

export const THETA_TABLE: readonly Estimate[] = BKLNW_ROWS.flatMap(([from, label, ...entries]) =>
  entries.map((m, i) => bklnwEntry(from, label, m, i + 1)),
)
