/**
 * What is wrong, where, and how to mend it. Callers branch on `code`, never on the prose.
 * One grammar: "Unexpected X at PLACE, expected Y".
 */
export interface Fault {
  /** Kebab-case and stable, e.g. `account-key-unknown`. */
  readonly code: string
  /** `account.yaml:12:3 venues.boards`, `mentions/2026.csv:17`, `template.md:4:1`. */
  readonly place: string
  readonly message: string
  /** What the reader can do about it, one sentence. */
  readonly mend: string
}

/** The input or the archive is at fault: exit code 1. */
export class InputFault extends Error {
  readonly faults: readonly Fault[]
  constructor(faults: readonly Fault[]) {
    super(faults.map((fault) => `${fault.place}: ${fault.message}`).join('\n'))
    this.name = 'InputFault'
    this.faults = faults
  }
}

/** The machine lacks something: exit code 3. The fault's `mend` says what to install. */
export class MachineFault extends Error {
  readonly fault: Fault
  constructor(fault: Fault) {
    super(`${fault.message} ${fault.mend}`)
    this.name = 'MachineFault'
    this.fault = fault
  }
}
