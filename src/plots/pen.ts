export interface TextStyle {
  color: string;
  align?: 'left' | 'center' | 'right';
  /** Face: words or figures. */
  face?: 'text' | 'figures';
  weight?: number;
  /** Colour around the letters, so that they stand clear of lines. */
  halo?: string;
}

/** Draws lines, areas and words; on a canvas and into SVG alike, so that what is exported is what is seen. */
export interface Pen {
  begin(): void;
  move(x: number, y: number): void;
  line(x: number, y: number): void;
  close(): void;
  /** Strokes the path that was begun. Width and dashes in the area's units. */
  stroke(color: string, width: number, dash?: readonly number[]): void;
  fill(color: string): void;
  rect(x: number, y: number, width: number, height: number, color: string): void;
  disc(x: number, y: number, radius: number, color: string): void;
  /** Words with their middle line at y. */
  text(words: string, x: number, y: number, style: TextStyle): void;
  /** Keeps to a rectangle until `unclip`. */
  clip(x: number, y: number, width: number, height: number): void;
  unclip(): void;
}

/** The one size of words on drawings, in CSS pixels: the application's small print. */
export const wordsPx = 13;

/** Figures set narrow, as tick labels have little room. */
export function fontOf(style: TextStyle, faces: { text: string; figures: string }, unit: number): string {
  const stretch = style.face === 'figures' ? 'condensed ' : '';
  const family = style.face === 'figures' ? faces.figures : faces.text;
  return `${stretch}${style.weight ?? 400} ${wordsPx * unit}px ${family}`;
}
