import { gcd } from '../arithmetic/integers.ts'

/**
 * A Dirichlet character modulo q, exactly: chi(n) = exp(2 pi i exponent(n) / order), `order` being the exponent of the group of
 * units, the same for all characters of q.
 */
export interface Character {
  readonly modulus: number
  readonly order: number
  /** exponents[n mod q], or -1 where chi(n) = 0. */
  readonly exponents: readonly number[]
}

/** The units modulo q, ascending: 1 <= a < q, coprime to q (and 1 for q = 1). */
export function units(q: number): number[] {
  return Array.from({ length: Math.max(1, q - 1) }, (_, i) => i + 1).filter((a) => gcd(BigInt(a), BigInt(q)) === 1n)
}

/**
 * All phi(q) characters modulo q, the principal one first. The group of units is written as a product of cyclic groups by
 * choosing, again and again, an element of largest order over the subgroup found so far, whose power first in that subgroup is 1
 * already; such an element exists in every finite abelian group. The result is checked: phi(q) distinct multiplicative maps.
 */
export function characters(q: number): Character[] {
  const group = units(q)
  let coordinates = new Map<number, number[]>([[1 % q, []]])
  const orders: number[] = []
  while (coordinates.size < group.length) {
    const generator = independentGenerator(q, group, coordinates)
    const extended = new Map<number, number[]>()
    let power = 1 % q
    for (let e = 0; e < generator.order; e++) {
      for (const [element, vector] of coordinates) extended.set((element * power) % q, [...vector, e])
      power = (power * generator.element) % q
    }
    coordinates = extended
    orders.push(generator.order)
  }
  const order = orders.reduce((l, d) => (l * d) / Number(gcd(BigInt(l), BigInt(d))), 1)
  let choices: number[][] = [[]]
  for (const d of orders) choices = choices.flatMap((c) => Array.from({ length: d }, (_, j) => [...c, j]))
  return choices.map((choice) => {
    const exponents = new Array<number>(Math.max(q, 1)).fill(-1)
    for (const [element, vector] of coordinates) {
      exponents[element % q] = vector.reduce((sum, e, i) => (sum + e * choice[i] * (order / orders[i])) % order, 0)
    }
    return { modulus: q, order, exponents }
  })
}

/** An element of the largest order modulo the subgroup that generates with it a direct product. */
function independentGenerator(q: number, group: number[], subgroup: Map<number, number[]>): { element: number; order: number } {
  let best = { element: 1, order: 1 }
  for (const element of group) {
    let [power, order] = [element % q, 1]
    while (!subgroup.has(power)) [power, order] = [(power * element) % q, order + 1]
    if (power === 1 % q && order > best.order) best = { element, order }
  }
  return best
}

export function isPrincipal(chi: Character): boolean {
  return chi.exponents.every((e) => e <= 0)
}

/** The complex conjugate's exponents equal these: chi takes real values only. */
export function isReal(chi: Character): boolean {
  return chi.exponents.every((e) => e < 0 || (2 * e) % chi.order === 0)
}

/** One of each pair of complex conjugate characters, and every real one that is not principal. */
export function upToConjugation(all: readonly Character[]): Character[] {
  const seen = new Set<string>()
  return all.filter((chi) => {
    if (isPrincipal(chi)) return false
    const conjugate = chi.exponents.map((e) => (e < 0 ? e : (chi.order - e) % chi.order)).join()
    if (seen.has(conjugate)) return false
    seen.add(chi.exponents.join())
    return true
  })
}
