import type { Fraction, MathNode } from 'mathjs'
import { gcd } from '../arithmetic/integers.ts'
import { type Polynomial, coefficientBits, combine, commonDivisor, content, degree, exactQuotient, leading, multiply } from '../arithmetic/polynomial.ts'
import { EngineRefusal } from '../errors.ts'

/** numerator(p) / denominator(p) in lowest terms: coprime, no common content, leading coefficient of the denominator positive. */
export interface RationalFunction {
  numerator: Polynomial
  denominator: Polynomial
}

const MAX_DEGREE = 60
const MAX_BITS = 2_000

let parse: ((expression: string) => MathNode) | undefined

/** The parser is a large library that only expressions need: whoever reads expressions loads it first. */
export async function loadExpressionParser(): Promise<void> {
  if (parse) return
  const { create, fractionDependencies, numericDependencies, parseDependencies } = await import('mathjs')
  const made = create({ parseDependencies, fractionDependencies, numericDependencies }, { number: 'Fraction' })
  parse = (expression) => made.parse(expression)
}

/**
 * Reads an expression in p, such as "1/(p*(p-1))", as an exact rational function. Numbers are read as exact decimals;
 * + - * / ^ with whole exponents, brackets and implied products are all there is. Refuses anything else, naming it. Needs
 * `loadExpressionParser` before.
 */
export function parseRationalFunction(expression: string): RationalFunction {
  if (!parse) throw new Error('the parser of expressions is not loaded')
  let tree: MathNode
  try {
    tree = parse(expression)
  } catch (error) {
    // The parser calls itself for every bracket; some hundred open ones exhaust the stack.
    if (error instanceof RangeError) throw refusal('The brackets are nested too deep.')
    throw refusal(`This is not an expression: ${error instanceof Error ? error.message : 'it cannot be read'}.`)
  }
  return reduce(evaluate(tree))
}

/** Lowest terms; refuses a denominator that is identically 0 and coefficients beyond the limits. */
export function reduce(f: RationalFunction): RationalFunction {
  if (f.denominator.length === 0) throw refusal('The denominator is 0 for every p.')
  const common = commonDivisor(f.numerator, f.denominator)
  const numerator = exactQuotient(f.numerator, common)
  const denominator = exactQuotient(f.denominator, common)
  const scale = gcd(content(numerator), content(denominator)) * (leading(denominator) < 0n ? -1n : 1n)
  return { numerator: numerator.map((c) => c / scale), denominator: denominator.map((c) => c / scale) }
}

function refusal(message: string): EngineRefusal {
  return new EngineRefusal('not_rational_function', 'expression', message)
}

function constant(numerator: bigint, denominator = 1n): RationalFunction {
  return { numerator: numerator === 0n ? [] : [numerator], denominator: [denominator] }
}

function limited(f: RationalFunction): RationalFunction {
  for (const part of [f.numerator, f.denominator]) {
    if (degree(part) > MAX_DEGREE) throw refusal(`The degree is above ${MAX_DEGREE}; write the function with smaller powers.`)
    if (coefficientBits(part) > MAX_BITS) throw refusal('The coefficients grow too large; write the function with smaller numbers.')
  }
  return f
}

function plus(a: RationalFunction, b: RationalFunction, sign: bigint): RationalFunction {
  return {
    numerator: combine(1n, multiply(a.numerator, b.denominator), sign, multiply(b.numerator, a.denominator)),
    denominator: multiply(a.denominator, b.denominator),
  }
}

function times(a: RationalFunction, b: RationalFunction): RationalFunction {
  return { numerator: multiply(a.numerator, b.numerator), denominator: multiply(a.denominator, b.denominator) }
}

function inverse(a: RationalFunction): RationalFunction {
  if (a.numerator.length === 0) throw refusal('There is a division by 0.')
  return { numerator: a.denominator, denominator: a.numerator }
}

function power(base: RationalFunction, exponent: RationalFunction): RationalFunction {
  const e = reduce(exponent)
  if (degree(e.numerator) > 0 || degree(e.denominator) > 0 || e.denominator[0] !== 1n) {
    throw refusal('An exponent must be a whole number, so that the function is a quotient of polynomials.')
  }
  const n = e.numerator[0] ?? 0n
  if (n > BigInt(MAX_DEGREE) || n < -BigInt(MAX_DEGREE)) throw refusal(`An exponent is beyond ${MAX_DEGREE}.`)
  let value = constant(1n)
  const factor = n < 0n ? inverse(base) : base
  for (let i = 0n; i < (n < 0n ? -n : n); i++) value = limited(times(value, factor))
  return value
}

/** Structural reading of the parsed tree; every node that is not arithmetic on p and exact numbers is refused. */
function evaluate(node: MathNode): RationalFunction {
  const inner = node as MathNode & { content?: MathNode; name?: string; value?: unknown; fn?: unknown; args?: MathNode[] }
  switch (node.type) {
    case 'ParenthesisNode':
      return evaluate(inner.content!)
    case 'ConstantNode': {
      const value = inner.value as Fraction
      if (typeof value !== 'object' || value === null || !('n' in value)) throw refusal('Only numbers and p are understood.')
      return limited(constant(BigInt(value.s) * BigInt(value.n), BigInt(value.d)))
    }
    case 'SymbolNode':
      if (inner.name !== 'p') throw refusal(`"${inner.name}" is not known here; the prime is written p.`)
      return { numerator: [0n, 1n], denominator: [1n] }
    case 'FunctionNode': {
      // "p(p-1)" is read by the parser as a call of p; a person means the product.
      const name = (inner.fn as { name?: string }).name ?? ''
      if (name === 'p' && inner.args!.length === 1) return limited(times({ numerator: [0n, 1n], denominator: [1n] }, evaluate(inner.args![0])))
      throw refusal(`"${name}" is not a rational function of p.`)
    }
    case 'OperatorNode':
      return limited(operate(String(inner.fn), inner.args!.map(evaluate)))
    default:
      throw refusal('Write one quotient of polynomials in p, such as 1/(p*(p-1)).')
  }
}

function operate(operator: string, args: RationalFunction[]): RationalFunction {
  switch (operator) {
    case 'add': return plus(args[0], args[1], 1n)
    case 'subtract': return plus(args[0], args[1], -1n)
    case 'unaryMinus': return plus(constant(0n), args[0], -1n)
    case 'unaryPlus': return args[0]
    case 'multiply': return times(args[0], args[1])
    case 'divide': return times(args[0], inverse(args[1]))
    case 'pow': return power(args[0], args[1])
    default: throw refusal(`"${operator}" is not allowed; use + - * / ^ and brackets.`)
  }
}
