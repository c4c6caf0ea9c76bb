/** What the model was given cannot be computed with. Callers branch on `code`; the message names index and value. */
export class ModelError extends Error {
  /** Kebab-case and stable, e.g. `weights-invalid`. */
  readonly code: string
  constructor(code: string, message: string) {
    super(message)
    this.name = 'ModelError'
    this.code = code
  }
}
