/** One of several words that a field offers. */
export interface Choice {
  value: string;
  label: string;
  /** Heading that the choice stands under. */
  group?: string;
}
