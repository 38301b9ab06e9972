export interface StairDrawingProps {
  codes: ArrayLike<number>;
  /** Lowest code of each column, where `codes` holds the highest ones. */
  low?: ArrayLike<number>;
  /** Codes run 0…2^bits − 1. */
  bits: number;
  /** Spoken name of the drawing. */
  label: string;
}

const width = 120;
const height = 40;

/** A small staircase for lists. Long tables show the lowest and the highest code of each column. */
export function StairDrawing({ codes, low = codes, bits, label }: StairDrawingProps) {
  const top = 2 ** bits - 1;
  const columns = Math.min(width, codes.length);
  const yOf = (code: number) => round(height - 2 - (code / top) * (height - 4));
  const upper: string[] = [];
  const lower: string[] = [];
  for (let column = 0; column < columns; column += 1) {
    const end = Math.floor(((column + 1) * codes.length) / columns);
    let highest = 0;
    let lowest = Infinity;
    for (let k = Math.floor((column * codes.length) / columns); k < end; k += 1) {
      highest = Math.max(highest, codes[k]);
      lowest = Math.min(lowest, low[k]);
    }
    const from = round((column * width) / columns);
    const to = round(((column + 1) * width) / columns);
    upper.push(`${from} ${yOf(highest)}H${to}`);
    lower.unshift(`${to} ${yOf(lowest)}H${from}`);
  }
  const treads = `M${upper.join('L')}`;
  return (
    <svg
      className="stair-drawing"
      viewBox={`0 0 ${width} ${height}`}
      preserveAspectRatio="none"
      role="img"
      aria-label={label}
    >
      <path d={`${treads}V${height}H0Z`} fill="var(--brick-wash)" />
      <path
        d={`${treads}L${lower.join('L')}Z`}
        fill="var(--brick)"
        stroke="var(--brick)"
        strokeWidth="1.5"
        vectorEffect="non-scaling-stroke"
      />
    </svg>
  );
}

function round(number: number): number {
  return Math.round(number * 100) / 100;
}
