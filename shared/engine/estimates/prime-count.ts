import { type Bound, type Claim, type Estimate, RECALLED, TRANSCRIBED, checkedTo8, outOfReach, sum, term, twoSided, underRiemannHypothesis, unconditional } from './estimate.ts'

const RS_1962 = 'J. B. Rosser, L. Schoenfeld, Approximate formulas for some functions of prime numbers, Illinois J. Math. 6 (1962) 64-94'
const DUSART_1999 = 'P. Dusart, The k-th prime is greater than k(ln k + ln ln k - 1) for k >= 2, Math. Comp. 68 (1999) 411-415, and C. R. Math. Acad. Sci. Soc. R. Can. 21 (1999) 53-59'
const DUSART_2018 = 'P. Dusart, Explicit estimates of some functions over primes, Ramanujan J. 45 (2018) 227-251'
const AXLER_2016 = 'C. Axler, New bounds for the prime counting function, Integers 16 (2016) A22, arXiv:1409.1780'

type Side = 'lower' | 'upper'

/** x/log x (c_0 + c_1/log x + c_2/log^2 x + …), as a bound and in words. */
function logSeries(coefficients: readonly string[]): { bound: Bound; text: string; latex: string } {
  const rest = coefficients.slice(1).flatMap((c, i): [string, number][] => (c === '0' ? [] : [[c, i + 1]]))
  const power = (k: number, log: string) => (k === 1 ? `${log} x` : `${log}^${k} x`)
  const inner = rest.length === 0 ? '' : ` (1 + ${rest.map(([c, k]) => `${c}/${k === 1 ? 'log x' : `${power(k, 'log')}`}`).join(' + ')})`
  const innerLatex = rest.length === 0 ? '' : `\\Bigl(1+${rest.map(([c, k]) => `\\frac{${c}}{${power(k, '\\log')}}`).join('+')}\\Bigr)`
  return {
    bound: sum(...coefficients.flatMap((c, k) => (c === '0' ? [] : [term(c, '1', String(-k - 1))]))),
    text: `${coefficients[0] === '1' ? '' : `${coefficients[0]} `}x/log x${inner}`,
    latex: `${coefficients[0] === '1' ? '' : coefficients[0]}\\frac{x}{\\log x}${innerLatex}`,
  }
}

/** x/(log x - c_0 - c_1/log x - …). */
function shifted(coefficients: readonly string[]): { bound: Bound; text: string; latex: string } {
  const parts = coefficients.map((c, k) => (k === 0 ? c : `${c}/${k === 1 ? 'log x' : `log^${k} x`}`)).join(' - ')
  const latex = coefficients.map((c, k) => (k === 0 ? c : `\\frac{${c}}{${k === 1 ? '\\log x' : `\\log^${k} x`}}`)).join('-')
  return {
    bound: { form: 'quotient', terms: [term('1', '0', '1'), ...coefficients.map((c, k) => term(`-${c}`, '0', String(-k)))] },
    text: `x/(log x - ${parts})`,
    latex: `\\frac{x}{\\log x-${latex}}`,
  }
}

function one(id: string, title: string, side: Side, shape: { bound: Bound; text: string; latex: string }, from: string, source: string, checked: string, validFor = `x >= ${from}`): Estimate {
  const claim: Claim = { quantity: 'pi', from: { x: from }, to: null, [side]: shape.bound }
  const [sign, latexSign] = side === 'lower' ? ['>=', '\\ge'] : ['<=', '\\le']
  return unconditional(id, title, [`pi(x) ${sign} ${shape.text}`, `\\pi(x)${latexSign} ${shape.latex}`], validFor, source, checked, claim)
}

const ROOT_LOG = { ...term('1/8', '1/2', '1'), overPi: true as const }
const BEYOND_ONE = 'x > 1'

/** Estimates of pi(x), the number of primes up to x. */
export const PRIME_COUNT_ESTIMATES: readonly Estimate[] = [
  one('pi-rosser-schoenfeld-1962-3.1', 'Rosser, Schoenfeld 1962, (3.1)', 'lower', logSeries(['1', '1/2']), '59', `${RS_1962}, Theorem 1`, checkedTo8(RECALLED)),
  one('pi-rosser-schoenfeld-1962-3.2', 'Rosser, Schoenfeld 1962, (3.2)', 'upper', logSeries(['1', '3/2']), '2', `${RS_1962}, Theorem 1`, checkedTo8(RECALLED), BEYOND_ONE),
  one('pi-rosser-schoenfeld-1962-3.5', 'Rosser, Schoenfeld 1962, (3.5)', 'lower', logSeries(['1']), '17', `${RS_1962}, Corollary 1`, checkedTo8(TRANSCRIBED)),
  one('pi-rosser-schoenfeld-1962-3.6', 'Rosser, Schoenfeld 1962, (3.6)', 'upper', logSeries(['1.25506']), '2', `${RS_1962}, Corollary 1`, checkedTo8('statement seen quoted in a later paper'), BEYOND_ONE),
  one('pi-dusart-1999-lower', 'Dusart 1999, lower', 'lower', shifted(['1']), '5393', DUSART_1999, checkedTo8(TRANSCRIBED)),
  one('pi-dusart-1999-upper', 'Dusart 1999, upper', 'upper', shifted(['1.1']), '60184', DUSART_1999, checkedTo8(RECALLED)),
  one('pi-dusart-1999-lower-2', 'Dusart 1999, lower, second order', 'lower', logSeries(['1', '1', '1.8']), '32299', DUSART_1999, checkedTo8(RECALLED)),
  one('pi-dusart-1999-upper-2', 'Dusart 1999, upper, second order', 'upper', logSeries(['1', '1', '2.51']), '355991', DUSART_1999, checkedTo8(RECALLED)),
  one('pi-dusart-2018-cor-5.2-c', 'Dusart 2018, Corollary 5.2', 'lower', logSeries(['1', '1']), '599', `${DUSART_2018}, Corollary 5.2`, checkedTo8(TRANSCRIBED)),
  one('pi-dusart-2018-cor-5.2-d', 'Dusart 2018, Corollary 5.2', 'upper', logSeries(['1', '1.2762']), '2', `${DUSART_2018}, Corollary 5.2`, checkedTo8(TRANSCRIBED), BEYOND_ONE),
  one('pi-dusart-2018-cor-5.2-e', 'Dusart 2018, Corollary 5.2', 'lower', logSeries(['1', '1', '2']), '88789', `${DUSART_2018}, Corollary 5.2`, checkedTo8(TRANSCRIBED)),
  one('pi-dusart-2018-cor-5.2-f', 'Dusart 2018, Corollary 5.2', 'upper', logSeries(['1', '1', '2.53816']), '2', `${DUSART_2018}, Corollary 5.2`, checkedTo8(TRANSCRIBED), BEYOND_ONE),
  one('pi-dusart-2018-cor-5.3-c', 'Dusart 2018, Corollary 5.3', 'lower', shifted(['1', '1']), '468049', `${DUSART_2018}, Corollary 5.3`, checkedTo8(TRANSCRIBED)),
  one('pi-dusart-2018-cor-5.3-d', 'Dusart 2018, Corollary 5.3', 'upper', shifted(['1', '1.2311']), '5.6', `${DUSART_2018}, Corollary 5.3`, checkedTo8(TRANSCRIBED), 'x > 5.6'),
  one('pi-axler-2016-upper', 'Axler 2016, upper', 'upper', logSeries(['1', '1', '2', '6.35', '24.35', '121.75', '730.5', '6801.4']), '2', AXLER_2016, checkedTo8(RECALLED), BEYOND_ONE),
  one('pi-axler-2016-lower', 'Axler 2016, lower', 'lower', logSeries(['1', '1', '2', '5.65', '23.65', '118.25', '709.5', '4966.5']), '1332450001', AXLER_2016, outOfReach(RECALLED)),
  unconditional(
    'pi-trudgian-2016',
    'Trudgian 2016, Theorem 2',
    ['|pi(x) - li(x)| <= 0.2795 x log^(-3/4) x exp(-sqrt(log x / 6.455))', '|\\pi(x)-\\mathrm{li}(x)|\\le 0.2795\\,x\\,(\\log x)^{-3/4}e^{-\\sqrt{\\log x/6.455}}'],
    'x >= 229',
    'T. Trudgian, Updating the error term in the prime number theorem, Ramanujan J. 39 (2016) 225-234, arXiv:1401.2689, Theorem 2',
    checkedTo8(TRANSCRIBED),
    { quantity: 'pi-li', from: { x: '229' }, to: null, ...twoSided({ form: 'decay', coefficient: '0.2795', logPower: '-3/4', base: '1', rate: '1', r: '6.455' }) },
  ),
  unconditional(
    'pi-johnston-yang-2023-cor-1.3',
    'Johnston, Yang 2023, Corollary 1.3',
    ['|pi(x) - li(x)| <= 9.59 x log^0.515 x exp(-0.8274 sqrt(log x))', '|\\pi(x)-\\mathrm{li}(x)|\\le 9.59\\,x\\,(\\log x)^{0.515}e^{-0.8274\\sqrt{\\log x}}'],
    'x >= 2',
    'D. R. Johnston, A. Yang, Some explicit estimates for the error term in the prime number theorem, J. Math. Anal. Appl. 527 (2023) 127460, Corollary 1.3',
    checkedTo8(TRANSCRIBED),
    { quantity: 'pi-li', from: { x: '2' }, to: null, ...twoSided({ form: 'decay', coefficient: '9.59', logPower: '0.515', base: '1', rate: '0.8274', r: '1' }) },
  ),
  unconditional(
    'pi-johnston-2022',
    'Johnston 2022, from the verification of the Riemann hypothesis to height 3 * 10^12',
    ['|pi(x) - li(x)| < sqrt(x) log x / (8 pi)', '|\\pi(x)-\\mathrm{li}(x)|<\\frac{\\sqrt{x}\\,\\log x}{8\\pi}'],
    '2657 <= x <= 1.101 * 10^26',
    'D. R. Johnston, Improving bounds on prime counting functions by partial verification of the Riemann hypothesis, Ramanujan J. 59 (2022) 1307-1321',
    checkedTo8("statement seen in the paper's introduction"),
    { quantity: 'pi-li', from: { x: '2657' }, to: { x: '110100000000000000000000000' }, ...twoSided(sum(ROOT_LOG)) },
  ),
  underRiemannHypothesis(
    'pi-schoenfeld-1976-rh',
    'Schoenfeld 1976, under the Riemann hypothesis',
    ['|pi(x) - li(x)| < sqrt(x) log x / (8 pi)', '|\\pi(x)-\\mathrm{li}(x)|<\\frac{\\sqrt{x}\\,\\log x}{8\\pi}'],
    'x >= 2657',
    'L. Schoenfeld, Sharper bounds for the Chebyshev functions theta(x) and psi(x) II, Math. Comp. 30 (1976) 337-360, Corollary 1',
    checkedTo8('statement seen quoted in the introduction of a later paper'),
    { quantity: 'pi-li', from: { x: '2657' }, to: null, ...twoSided(sum(ROOT_LOG)) },
  ),
]
