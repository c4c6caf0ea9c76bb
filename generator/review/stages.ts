/** Where the work stands: told to whoever watches, on a terminal or in a log. */
export type Stage = 'intake' | 'fit' | 'document' | 'print'

export interface Progress {
  /** A stage begins. */
  stage(stage: Stage): void
  /** Something within the stage: a file, or how far the draws are, 0 to 1. */
  detail(text: string): void
  draws(share: number): void
  /** How far the forecasts of survey waves are, 0 to 1. */
  forecasts(share: number): void
}

/** Tells nobody. */
export const silent: Progress = { stage: () => undefined, detail: () => undefined, draws: () => undefined, forecasts: () => undefined }
