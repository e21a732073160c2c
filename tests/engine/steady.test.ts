import { describe, expect, it } from 'vitest'
import { steadyExp, steadyLog } from '../../shared/engine/arithmetic/steady.ts'

describe('exp and log by basic operations', () => {
  it("are near the platform's own", () => {
    for (let x = -600; x < 600; x += 7.3) expect(Math.abs(steadyExp(x) / Math.exp(x) - 1)).toBeLessThan(1e-11)
    for (let v = 1e-9; v < 1e9; v *= 3.7) expect(Math.abs(steadyLog(v) - Math.log(v))).toBeLessThan(1e-12 * Math.max(1, Math.abs(Math.log(v))))
    expect(steadyExp(-1000)).toBe(0)
  })
})
