/**
 * The wheel of 30: byte i of a sieve stands for the eight numbers 30 i + r, r coprime to 30, bit j for r = RESIDUES[j].
 * The primes 2, 3 and 5 are not represented; whoever reads a sieve adds them.
 */
export const WHEEL = 30
export const RESIDUES = [1, 7, 11, 13, 17, 19, 23, 29] as const
export const WHEEL_PRIMES = [2, 3, 5] as const

/** BIT_OF[r] = j where RESIDUES[j] = r, else -1. */
export const BIT_OF = Int8Array.from({ length: WHEEL }, (_, r) => RESIDUES.indexOf(r as (typeof RESIDUES)[number]))

/** Sieves are read as 32-bit words, four bytes each, lowest bit first: that needs the usual byte order. */
if (new Uint8Array(Uint32Array.of(1).buffer)[0] !== 1) throw new Error('the sieve needs a little-endian machine')

/** Clears in byte `index` of a sieve, which stands for 30 `byte` + r, every number outside (lo, hi]. */
export function clipByte(bytes: Uint8Array, index: number, byte: number, lo: number, hi: number): void {
  for (let j = 0; j < 8; j++) {
    const n = WHEEL * byte + RESIDUES[j]
    if (n <= lo || n > hi) bytes[index] &= ~(1 << j)
  }
}
