import { type Bound, type Estimate, RECALLED, checkedTo8, outOfReach, sum, term, twoSided, unconditional } from './estimate.ts'

const BENNETT_2018 =
  'M. A. Bennett, G. Martin, K. O\'Bryant, A. Rechnitzer, Explicit bounds for primes in arithmetic progressions, Illinois J. Math. 62 (2018) 427-532, arXiv:1802.00085'
const RAMARE_RUMELY_1996 = 'O. Ramaré, R. Rumely, Primes in arithmetic progressions, Math. Comp. 65 (1996) 397-425'
const DUSART_2002 = 'P. Dusart, Estimates of theta(x;k,l) for large values of x, Math. Comp. 71 (2002) 1137-1168'

const QUANTITY = '|theta(x;q,a) - x/phi(q)|'
const QUANTITY_LATEX = '\\Bigl|\\theta(x;q,a)-\\frac{x}{\\varphi(q)}\\Bigr|'
const FROM_BENNETT = '8000000000'

function overClasses(
  id: string,
  title: string,
  [words, latex]: readonly [string, string],
  [least, most]: readonly [number, number],
  [from, to]: readonly [string, string | null],
  source: string,
  checked: string,
  bound: Bound,
): Estimate {
  const moduli = least === most ? `q = ${least}` : `${least} <= q <= ${most}`
  const range = to === null ? `x >= ${from}` : `${from} <= x <= ${to}`
  return unconditional(
    id,
    title,
    [`${QUANTITY} ${words} for a prime to q`, `${QUANTITY_LATEX}${latex},\\quad (a,q)=1`],
    `${range}, ${moduli}`,
    source,
    checked,
    { quantity: 'theta-class', moduli: [least, most], from: { x: from }, to: to === null ? null : { x: to }, ...twoSided(bound) },
  )
}

/** Estimates of theta(x;q,a), the sum of log p over the primes p <= x in the class of a mod q: each holds for all moduli of its range. */
export const THETA_CLASS_ESTIMATES: readonly Estimate[] = [
  overClasses(
    'theta-class-ramare-rumely-1996-thm-2',
    'Ramaré, Rumely 1996, Theorem 2, up to 10^10',
    ['<= 2.072 sqrt(x)', '\\le 2.072\\sqrt{x}'],
    [3, 72],
    ['1', '10000000000'],
    `${RAMARE_RUMELY_1996}, Theorem 2`,
    `${checkedTo8(RECALLED)} Beyond, a separate computation in doubles looked at every jump up to 10^10, the whole range of the statement, for each modulus: the largest quotient by sqrt(x) is 1.818.`,
    sum(term('2.072', '1/2', '0')),
  ),
  overClasses(
    'theta-class-bennett-2018-thm-1.2',
    'Bennett et al. 2018, moduli up to 10^4',
    ['< x / (840 log x)', '<\\frac{1}{840}\\,\\frac{x}{\\log x}'],
    [3, 10_000],
    [FROM_BENNETT, null],
    `${BENNETT_2018}, Theorems 1.1 and 1.2`,
    outOfReach("the constant 1/840 taken from a survey; the paper's abstract was seen, its theorem not"),
    sum(term('1/840', '1', '-1')),
  ),
  overClasses(
    'theta-class-bennett-2018-abstract',
    'Bennett et al. 2018, moduli up to 10^5',
    ['< x / (160 log x)', '<\\frac{1}{160}\\,\\frac{x}{\\log x}'],
    [3, 100_000],
    [FROM_BENNETT, null],
    `${BENNETT_2018}, abstract`,
    outOfReach("statement seen in the paper's abstract"),
    sum(term('1/160', '1', '-1')),
  ),
  overClasses(
    'theta-class-dusart-2002-mod-3',
    'Dusart 2002, modulus 3',
    ['< 0.262 x / log x', '<0.262\\,\\frac{x}{\\log x}'],
    [3, 3],
    ['1531', null],
    `${DUSART_2002}, abstract`,
    checkedTo8("statement seen in the paper's abstract"),
    sum(term('0.262', '1', '-1')),
  ),
]
