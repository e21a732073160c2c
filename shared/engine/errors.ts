/**
 * Why the engine will not do what was asked. `code` is stable and machine-readable, `field` names the input at fault
 * (`k`, `exclude`, `digits`, `logPower`, …), the message is one sentence for a person and says what to do instead.
 */
export class EngineRefusal extends Error {
  readonly code: string
  readonly field: string
  constructor(code: string, field: string, message: string) {
    super(message)
    this.name = 'EngineRefusal'
    this.code = code
    this.field = field
  }
}
