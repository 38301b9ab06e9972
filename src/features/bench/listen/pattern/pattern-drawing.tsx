import { patternMs, type PulsePattern } from '../../../../../shared/contract/index.ts';
import { axisTimes, blocksOf, stepMarks } from './drawn.ts';
import { sayPattern } from './words.ts';

const [width, height] = [360, 104];
const [left, right] = [4, 26];
const span = width - left - right;
const [top, ground, axis] = [22, 74, 90];

/** The pattern over time: a block where it sounds, the bare ground where it pauses, steps by their numbers above. */
export function PatternDrawing({ pattern }: { pattern: PulsePattern }) {
  const whole = patternMs(pattern);
  const words = sayPattern(pattern);
  const x = (at: number) => (left + at).toFixed(2);
  const inSeconds = whole >= 10_000;
  const times = axisTimes(whole, 5);
  return (
    <figure className="pattern-drawing">
      <svg viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`Pattern over time. ${words}`}>
        {stepMarks(pattern, span, 14).map(({ step, at }) => (
          <g key={step}>
            <path className="pattern-mark" d={`M${x(at)} 6V${ground}`} />
            <text className="pattern-number" x={Number(x(at)) + 3} y={14}>
              {step}
            </text>
          </g>
        ))}
        {blocksOf(pattern, span).map(({ from, to, isDense }) => (
          <rect
            key={from}
            className={isDense ? 'pattern-block pattern-dense' : 'pattern-block'}
            x={x(from)}
            y={top}
            width={Math.max(0.6, to - from).toFixed(2)}
            height={ground - top}
          />
        ))}
        <path className="pattern-ground" d={`M${left} ${ground}H${width - right}`} />
        <path
          className="pattern-after"
          d={
            pattern.endless
              ? `M${width - right} ${ground}h18V${top - 6}m-4 5l4-5l4 5`
              : `M${width - right} ${ground}h20M${width - right + 20} ${ground - 6}v12`
          }
        />
        {times.map((ms, k) => (
          <g key={ms}>
            <path className="pattern-tick" d={`M${x((ms / whole) * span)} ${ground}v5`} />
            <text
              className="pattern-time"
              x={x((ms / whole) * span)}
              y={axis}
              textAnchor={k === 0 ? 'start' : 'middle'}
            >
              {inSeconds ? ms / 1000 : ms}
            </text>
          </g>
        ))}
        <text className="pattern-time" x={width} y={height - 2} textAnchor="end">
          {inSeconds ? 'seconds' : 'milliseconds'}
        </text>
      </svg>
      <figcaption>{words}</figcaption>
    </figure>
  );
}
