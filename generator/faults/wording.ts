/** What a wording says: the two halves of "Unexpected X at PLACE, expected Y", and the mend. */
export interface Wording {
  readonly unexpected: string
  readonly expected: string
  readonly mend: string
}
