export interface StairDrawingProps {
  codes: ArrayLike<number>;
  /** Codes run 0…2^bits − 1. */
  bits: number;
  /** Spoken name of the drawing. */
  label: string;
}

const width = 120;
const height = 40;

/** A small staircase for lists. Long tables show the highest code of each column. */
export function StairDrawing({ codes, bits, label }: StairDrawingProps) {
  const top = 2 ** bits - 1;
  const columns = Math.min(width, codes.length);
  let treads = '';
  for (let column = 0; column < columns; column += 1) {
    const end = Math.floor(((column + 1) * codes.length) / columns);
    let highest = 0;
    for (let k = Math.floor((column * codes.length) / columns); k < end; k += 1)
      highest = Math.max(highest, codes[k]);
    const y = height - 2 - (highest / top) * (height - 4);
    treads += `${column === 0 ? 'M' : 'L'}${round((column * width) / columns)} ${round(y)}H${round(((column + 1) * width) / columns)}`;
  }
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
        d={treads}
        fill="none"
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
