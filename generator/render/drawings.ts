/** Pictures that were drawn before, by all that they are drawn from. */
export interface Drawings {
  remember(key: string, draw: () => Promise<string>): Promise<string>
}

/** Every picture is drawn. */
export const drawEach: Drawings = { remember: (_, draw) => draw() }

/** Pictures of the last two rounds are kept: who edits a template mostly changes other things. */
export function keepDrawings(): Drawings & { readonly nextRound: () => void } {
  let [last, now] = [new Map<string, string>(), new Map<string, string>()]
  return {
    remember: async (key, draw) => {
      const svg = now.get(key) ?? last.get(key) ?? await draw()
      now.set(key, svg)
      return svg
    },
    nextRound: () => { [last, now] = [now, new Map()] },
  }
}
