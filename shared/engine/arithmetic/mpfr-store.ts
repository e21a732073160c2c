import { type GMPFunctions, init, mpfr_rnd_t } from 'gmp-wasm'
import { type Rational, dyadic } from './rational.ts'

export const DOWN = mpfr_rnd_t.MPFR_RNDD
export const UP = mpfr_rnd_t.MPFR_RNDU

/** A float of MPFR: an address in the library's memory. */
export type Pointer = number

/** The numbers of a frame carry its count, so that none is used after its memory was given to another. */
export interface Interval {
  readonly lo: Pointer
  readonly hi: Pointer
  readonly epoch: number
}

/** Numbers that live until the arithmetic is collected. */
const KEPT = 0

/** Room for the digits of one integer at first, in bytes. */
const LEAST_TEXT = 4_096

/** Gives the memory of an arithmetic's floats back when nobody holds the arithmetic any more. */
const collected = new FinalizationRegistry<Held>(({ g, all, integer, text }) => {
  g.mpz_clear(integer)
  g.mpz_t_free(integer)
  g.free(text.address)
  for (const pointer of all) {
    g.mpfr_clear(pointer)
    g.mpfr_t_free(pointer)
  }
})

interface Held {
  readonly g: GMPFunctions
  readonly all: Pointer[]
  readonly integer: number
  /** Where the digits of an integer are handed over. */
  readonly text: { address: number; size: number }
}

/**
 * The memory behind intervals of one precision, and the ways in and out of it. Frames lie on a stack: one that ends gives its floats
 * to the next, and those of the frames around it stay.
 */
export class MpfrStore {
  readonly g: GMPFunctions
  readonly precision: number
  private readonly all: Pointer[] = []
  private readonly pool: Pointer[] = []
  private readonly integer: number
  private readonly text: Held['text']
  private readonly alive = new Set([KEPT])
  private next = 0
  private epoch = KEPT
  private lastEpoch = KEPT

  static async open(precision: number): Promise<MpfrStore> {
    const { binding } = await init()
    return new MpfrStore(binding, precision)
  }

  constructor(g: GMPFunctions, precision: number) {
    this.g = g
    this.precision = precision
    this.integer = g.mpz_t()
    g.mpz_init(this.integer)
    this.text = { address: g.malloc(LEAST_TEXT), size: LEAST_TEXT }
    collected.register(this, { g, all: this.all, integer: this.integer, text: this.text })
  }

  /** A float of `bits` bits for good. */
  float(bits = this.precision): Pointer {
    const pointer = this.g.mpfr_t()
    this.g.mpfr_init2(pointer, bits)
    this.all.push(pointer)
    return pointer
  }

  /** A new interval, its end points not set yet. */
  interval(): Interval {
    if (this.epoch === KEPT) return { lo: this.float(), hi: this.float(), epoch: KEPT }
    while (this.pool.length < this.next + 2) this.pool.push(this.float())
    this.next += 2
    return { lo: this.pool[this.next - 2], hi: this.pool[this.next - 1], epoch: this.epoch }
  }

  /** Throws where the number's frame is over. */
  check(x: { readonly epoch: number }): void {
    if (x.epoch !== this.epoch && !this.alive.has(x.epoch)) throw new Error('a number is used after its frame has ended')
  }

  frame<T>(work: () => T): T {
    const [outer, start] = [this.epoch, this.next]
    this.epoch = ++this.lastEpoch
    this.alive.add(this.epoch)
    try {
      return work()
    } finally {
      this.alive.delete(this.epoch)
      this.epoch = outer
      this.next = start
    }
  }

  keep<T>(work: () => T): T {
    const inside = this.epoch
    this.epoch = KEPT
    try {
      return work()
    } finally {
      this.epoch = inside
    }
  }

  /** The library's big integer with this value, until the next call. */
  big(n: bigint): number {
    const digits = n.toString(16)
    const { g, text } = this
    if (digits.length >= text.size) {
      g.free(text.address)
      text.size = 2 * digits.length
      text.address = g.malloc(text.size)
    }
    // By hand: an encoder costs several times the conversion itself. The view is taken anew, as memory moves when it grows.
    const memory = g.mem
    for (let i = 0; i < digits.length; i++) memory[text.address + i] = digits.charCodeAt(i)
    memory[text.address + digits.length] = 0
    g.mpz_set_str(this.integer, text.address, 16)
    return this.integer
  }

  /** The exact value of a float, which must be a number. */
  exact(pointer: Pointer): Rational {
    this.checkNumber(pointer)
    if (this.g.mpfr_zero_p(pointer)) return { num: 0n, den: 1n }
    const exponent = this.g.mpfr_get_z_2exp(this.integer, pointer)
    return dyadic(this.readInteger(), -exponent)
  }

  /** floor or ceiling of a float times 2^precision. */
  scaledInteger(pointer: Pointer, scratch: Pointer, direction: mpfr_rnd_t): bigint {
    this.checkNumber(pointer)
    this.g.mpfr_mul_2si(scratch, pointer, this.precision, direction)
    this.g.mpfr_get_z(this.integer, scratch, direction)
    return this.readInteger()
  }

  private checkNumber(pointer: Pointer): void {
    if (!this.g.mpfr_number_p(pointer)) throw new RangeError('a result is no number')
  }

  private readInteger(): bigint {
    const text = this.g.mpz_to_string(this.integer, 16)
    return text.startsWith('-') ? -BigInt(`0x${text.slice(1)}`) : BigInt(`0x${text}`)
  }
}
