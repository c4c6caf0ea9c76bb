/** A figure, or the reason why it can't be decided: never NaN. */
export type Decidable<Reason extends string> =
  | { readonly value: number }
  | { readonly value: null; readonly reason: Reason }
