import { type Rational, ZERO } from '../arithmetic/rational.ts'
import type { ShardResult } from './computation.ts'
import type { PanelsParameters } from './panels-parameters.ts'
import { meanPoint, nodeCost } from './panels-plan.ts'
import type { BlockSums } from './panels-sweep.ts'

/** Cutting a run by panels into blocks of nodes, and their results as exact JSON. */

/** Pairs from <= index < to of one piece; piece 0 is the edge. */
export interface Block {
  piece: number
  from: number
  to: number
  /** heuristic: affects speed only */
  cost: number
}

/** A block's sums and which block they are of, so that results of another cut are told. */
export type BlockResult = BlockSums & Pick<Block, 'piece' | 'from' | 'to'>

/** About as many shards as there are, so that progress is smooth, cores are kept busy and an interruption loses little. */
const SHARDS = 48
const LEAST_PAIRS = 2
/** What the product rule adds to a node at the edge. */
const EDGE_COST = 1.3

/** Blocks of about equal cost. */
export function cutIntoBlocks(p: PanelsParameters, power: Rational, complexity: number): Block[] {
  const cost = (from: Rational, to: Rational): number => nodeCost({ ...p, complexity }, meanPoint(power, from, to))
  const pieces = [
    { nodes: p.edgeNodes, each: EDGE_COST * cost(ZERO, p.edge) },
    ...p.panels.map(({ nodes, from, to }) => ({ nodes, each: cost(from, to) })),
  ]
  const whole = pieces.reduce((total, { nodes, each }) => total + nodes * each, 0)
  return pieces.flatMap(({ nodes, each }, piece) => {
    const pairs = Math.ceil(nodes / 2)
    const count = Math.max(1, Math.min(Math.floor(pairs / LEAST_PAIRS), Math.round((SHARDS * nodes * each) / whole)))
    return Array.from({ length: count }, (_, i): Block => {
      const [from, to] = [Math.floor((i * pairs) / count), Math.floor(((i + 1) * pairs) / count)]
      return { piece, from, to, cost: 2 * (to - from) * each }
    })
  })
}

export function writeBlock({ piece, from, to }: Block, block: BlockSums): ShardResult {
  const text = (pair: { centre: bigint; reach: bigint }): string[] => [pair.centre.toString(), pair.reach.toString()]
  return {
    pairs: [piece, from, to],
    sums: block.sums.map(([lo, hi]) => [lo.toString(), hi.toString()]),
    weights: Object.fromEntries(Object.entries(block.weights).map(([key, sizes]) => [key, sizes.map(String)])),
    first: text(block.first),
    last: text(block.last),
  }
}

interface WrittenBlock {
  pairs: [number, number, number]
  sums: string[][]
  weights: Record<string, string[]>
  first: string[]
  last: string[]
}

/** Reads the result of `block`; throws where it is that of another. */
export function readBlock(block: Block, result: ShardResult): BlockResult {
  const { pairs, sums, weights, first, last } = result as unknown as WrittenBlock
  const [piece, from, to] = pairs
  if (piece !== block.piece || from !== block.from || to !== block.to) throw new Error('these results belong to another cut of the run')
  const pair = ([centre, reach]: string[]) => ({ centre: BigInt(centre), reach: BigInt(reach) })
  return {
    piece,
    from,
    to,
    sums: sums.map(([lo, hi]) => [BigInt(lo), BigInt(hi)]),
    weights: Object.fromEntries(Object.entries(weights).map(([key, sizes]) => [key, sizes.map(BigInt)])),
    first: pair(first),
    last: pair(last),
  }
}
