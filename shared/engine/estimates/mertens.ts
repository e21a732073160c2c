import { type Estimate, type Quantity, RECALLED, TRANSCRIBED, type Term, checkedTo8, sum, term, twoSided, underRiemannHypothesis, unconditional } from './estimate.ts'

const RS_1962 = 'J. B. Rosser, L. Schoenfeld, Approximate formulas for some functions of prime numbers, Illinois J. Math. 6 (1962) 64-94'
const DUSART_2010 = 'P. Dusart, Estimates of some functions over primes without R.H., arXiv:1002.0442 (2010)'
const DUSART_2018 = 'P. Dusart, Explicit estimates of some functions over primes, Ramanujan J. 45 (2018) 227-251'
const AXLER_2018 = 'C. Axler, New estimates for some functions defined over primes, Integers 18 (2018) A52'
const VANLALNGAIA_2017 = 'R. Vanlalngaia, Explicit Mertens sums, Integers 17 (2017) A11'
const SCHOENFELD_1976 = 'L. Schoenfeld, Sharper bounds for the Chebyshev functions theta(x) and psi(x) II, Math. Comp. 30 (1976) 337-360'

const WORDS: Record<'reciprocals' | 'log-ratios', [text: string, latex: string]> = {
  reciprocals: ['|sum of 1/p over p <= x - log log x - B|', '\\Bigl|\\sum_{p\\le x}\\frac1p-\\log\\log x-B\\Bigr|'],
  'log-ratios': ['|sum of log p/p over p <= x - log x - E|', '\\Bigl|\\sum_{p\\le x}\\frac{\\log p}{p}-\\log x-E\\Bigr|'],
}

type MertensQuantity = Extract<Quantity, keyof typeof WORDS>

/** [coefficient, k] for coefficient / log^k x. */
type LogTerm = [coefficient: string, k: number]

const toTerm = ([coefficient, k]: LogTerm): Term => term(coefficient, '0', String(-k))

function bounded(id: string, title: string, quantity: MertensQuantity, terms: LogTerm[], from: string, source: string, checked: string): Estimate {
  const log = (k: number, name: string) => (k === 1 ? `${name} x` : `${name}^${k} x`)
  const [text, latex] = WORDS[quantity]
  const statement = `${text} <= ${terms.map(([c, k]) => `${c}/${log(k, 'log')}`).join(' + ')}`
  const statementLatex = `${latex}\\le ${terms.map(([c, k]) => `\\frac{${c}}{${log(k, '\\log')}}`).join('+')}`
  return unconditional(id, title, [statement, statementLatex], `x >= ${from}`, source, checked, {
    quantity, from: { x: from }, to: null, ...twoSided(sum(...terms.map(toTerm))),
  })
}

const overRoot = (coefficient: string, logPower: string): Term => ({ ...term(coefficient, '-1/2', logPower), overPi: true })

/** Estimates of Mertens' sums, B = 0.26149… and E = -1.33258…. */
export const MERTENS_ESTIMATES: readonly Estimate[] = [
  bounded('mertens-rosser-schoenfeld-1962-thm-5', 'Rosser, Schoenfeld 1962, Theorem 5', 'reciprocals', [['1/2', 2]], '286', `${RS_1962}, Theorem 5`, checkedTo8(RECALLED)),
  bounded('mertens-rosser-schoenfeld-1962-thm-6', 'Rosser, Schoenfeld 1962, Theorem 6', 'log-ratios', [['1/2', 1]], '319', `${RS_1962}, Theorem 6`, checkedTo8(RECALLED)),
  bounded('mertens-dusart-2010-reciprocals', 'Dusart 2010', 'reciprocals', [['1/10', 2], ['4/15', 3]], '10372', DUSART_2010, checkedTo8(RECALLED)),
  bounded('mertens-dusart-2010-log-ratios', 'Dusart 2010', 'log-ratios', [['0.2', 1], ['0.2', 2]], '2974', DUSART_2010, checkedTo8(RECALLED)),
  bounded('mertens-dusart-2018-thm-5.6', 'Dusart 2018, Theorem 5.6', 'reciprocals', [['0.2', 3]], '2278383', `${DUSART_2018}, Theorem 5.6`, checkedTo8(TRANSCRIBED)),
  bounded('mertens-dusart-2018-thm-5.7', 'Dusart 2018, Theorem 5.7', 'log-ratios', [['0.3', 2]], '912560', `${DUSART_2018}, Theorem 5.7`, checkedTo8(TRANSCRIBED)),
  bounded('mertens-axler-2018-reciprocals', 'Axler 2018', 'reciprocals', [['1/20', 3], ['3/16', 4]], '46909074', AXLER_2018, checkedTo8(RECALLED)),
  bounded('mertens-axler-2018-log-ratios', 'Axler 2018', 'log-ratios', [['3/40', 2], ['3/20', 3]], '30972320', AXLER_2018, checkedTo8(RECALLED)),
  bounded('mertens-vanlalngaia-2017-2', 'Vanlalngaia 2017, all x', 'reciprocals', [['4', 3]], '2', VANLALNGAIA_2017, checkedTo8(TRANSCRIBED)),
  bounded('mertens-vanlalngaia-2017-1000', 'Vanlalngaia 2017, x >= 1000', 'reciprocals', [['2.3', 3]], '1000', VANLALNGAIA_2017, checkedTo8(TRANSCRIBED)),
  bounded('mertens-vanlalngaia-2017-24284', 'Vanlalngaia 2017, x >= 24284', 'reciprocals', [['1', 3]], '24284', VANLALNGAIA_2017, checkedTo8(TRANSCRIBED)),
  underRiemannHypothesis(
    'mertens-schoenfeld-1976-rh-6.21',
    'Schoenfeld 1976, (6.21), under the Riemann hypothesis',
    [`${WORDS.reciprocals[0]} < (3 log x + 4)/(8 pi sqrt(x))`, `${WORDS.reciprocals[1]}<\\frac{3\\log x+4}{8\\pi\\sqrt{x}}`],
    'x >= 13.5',
    `${SCHOENFELD_1976}, (6.21)`,
    checkedTo8(RECALLED),
    { quantity: 'reciprocals', from: { x: '13.5' }, to: null, ...twoSided(sum(overRoot('3/8', '1'), overRoot('1/2', '0'))) },
  ),
  underRiemannHypothesis(
    'mertens-schoenfeld-1976-rh-6.22',
    'Schoenfeld 1976, (6.22), under the Riemann hypothesis',
    [`${WORDS['log-ratios'][0]} < (3 log^2 x + 6 log x + 12)/(8 pi sqrt(x))`, `${WORDS['log-ratios'][1]}<\\frac{3\\log^2 x+6\\log x+12}{8\\pi\\sqrt{x}}`],
    'x >= 8.4',
    `${SCHOENFELD_1976}, (6.22)`,
    checkedTo8(RECALLED),
    { quantity: 'log-ratios', from: { x: '8.4' }, to: null, ...twoSided(sum(overRoot('3/8', '2'), overRoot('3/4', '1'), overRoot('3/2', '0'))) },
  ),
]
