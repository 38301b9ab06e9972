/** A figure as it is shown, with what explains it in place. */
export interface ShownFigure {
  readonly id: string;
  readonly label: string;
  readonly value: string;
  readonly unit?: string;
  readonly tone?: 'attention' | 'good';
  /** What it tells. */
  readonly meaning: string;
  /** How it is computed, as the engine specification writes it. */
  readonly formula: string;
  /** What is good, or what to compare it with. */
  readonly good: string;
  /** Why it does not exist here. */
  readonly missing?: string;
}
