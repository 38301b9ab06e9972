import { carrierFigures, exactPower } from '../analysis/index.ts';
import type { TableSettings } from '../contract/index.ts';
import { linesOf, transformOf } from '../dft/index.ts';

/** A table that plays through converters: its codes and the levelled cycle that they stand for. */
export interface PlayedTable {
  readonly codes: Uint16Array;
  readonly cycle: Float64Array;
  readonly range: TableSettings['range'];
  /** What follows the converter does to each line, bins 0…⌊N/2⌋; nothing where absent. */
  readonly gains?: Float64Array;
}

/** Figures of one table through one converter; NaN where a figure does not exist. */
export type SaveFigures = (sinadDb: number, unwantedDb: number) => void;

/**
 * SINAD and `unwantedDb` (engine specification §4) of one table through one converter after another. The voltages
 * are mapped to signal units by the line of §3.4, from lowest to highest. Two converters share a complex transform,
 * so that figures come when the second is there, or at `flush`.
 */
export class TableThrough {
  readonly #table: PlayedTable;
  readonly #transform: ReturnType<typeof transformOf>['forward'];
  readonly #data: Float64Array;
  readonly #out: Float64Array;
  readonly #amplitudes: Float64Array;
  readonly #wanted: ReturnType<typeof linesOf>;
  readonly #strongestWanted: number;
  /** The cycle's strongest line below N/2; 0 where it has none. */
  readonly #carrier: number;
  #waiting: SaveFigures | null = null;

  constructor(table: PlayedTable) {
    const size = table.codes.length;
    this.#table = table;
    this.#transform = transformOf(size).forward;
    // Arrays of our own: those of the plan serve other callers between two converters.
    this.#data = new Float64Array(2 * size);
    this.#out = new Float64Array(2 * size);
    this.#wanted = linesOf(table.cycle);
    this.#amplitudes = new Float64Array(this.#wanted.re.length);
    const { re, im } = this.#wanted;
    let strongest = 0;
    let carrier = 0;
    for (let k = 1; k < re.length; k += 1) {
      const isHalf = 2 * k === size;
      const own = (re[k] ** 2 + im[k] ** 2) * (table.gains?.[k] ?? 1) ** 2 * (isHalf ? 1 : 4);
      if (own <= strongest) continue;
      strongest = own;
      carrier = isHalf ? 0 : k;
    }
    this.#carrier = carrier;
    // A constant's lines are rounding noise.
    const isConstant = table.cycle.every((value) => value === table.cycle[0]);
    this.#strongestWanted = isConstant ? 0 : strongest;
  }

  /** @param low lowest and @param high highest voltage of all codes */
  add(volts: Float64Array, low: number, high: number, save: SaveFigures): void {
    const { codes, range } = this.#table;
    const part = this.#waiting === null ? 0 : 1;
    const gain = (range === 'bipolar' ? 2 : 1) / (high - low);
    const offset = range === 'bipolar' ? -1 : 0;
    const data = this.#data;
    for (let k = 0; k < codes.length; k += 1) data[2 * k + part] = (volts[codes[k]] - low) * gain + offset;
    if (this.#waiting === null) {
      this.#waiting = save;
      return;
    }
    this.#transform(this.#out, data);
    const saveFirst = this.#waiting;
    this.#waiting = null;
    this.#figures(0, saveFirst);
    this.#figures(1, save);
  }

  /** Gives the figures of a converter that waits for a second one. */
  flush(): void {
    if (this.#waiting === null) return;
    for (let i = 1; i < this.#data.length; i += 2) this.#data[i] = 0;
    this.#transform(this.#out, this.#data);
    const save = this.#waiting;
    this.#waiting = null;
    this.#figures(0, save);
  }

  /** Of `x = a + i·b` the lines are `A_k = (X_k + conj X_{N−k})/2` and `B_k = (X_k − conj X_{N−k})/2i`. */
  #figures(part: 0 | 1, save: SaveFigures): void {
    const out = this.#out;
    const amplitudes = this.#amplitudes;
    const size = this.#table.codes.length;
    const { re: wantedRe, im: wantedIm } = this.#wanted;
    const { gains } = this.#table;
    const carrier = this.#carrier;
    let strongestAdded = 0;
    let addedPower = 0;
    let strongestOther = 0;
    let otherPower = 0;
    for (let k = 1; k < amplitudes.length; k += 1) {
      const a = 2 * k;
      const b = 2 * (size - k);
      const re = (part === 0 ? out[a] + out[b] : out[a + 1] + out[b + 1]) / 2;
      const im = (part === 0 ? out[a + 1] - out[b + 1] : out[b] - out[a]) / 2;
      const addedRe = re - wantedRe[k];
      const addedIm = im - wantedIm[k];
      const scale = (a === size ? 1 : 2) * (gains === undefined ? 1 : gains[k]);
      const added = (addedRe * addedRe + addedIm * addedIm) * scale * scale;
      const own = (re * re + im * im) * scale * scale;
      if (added > strongestAdded) strongestAdded = added;
      addedPower += a === size ? added : added / 2;
      // Squares of amplitudes, times N²; roots are taken where they are wanted.
      amplitudes[k] = own;
      if (k === carrier) continue;
      if (own > strongestOther) strongestOther = own;
      otherPower += a === size ? own : own / 2;
    }
    const perSquare = 1 / (size * size);
    const isExact = addedPower * perSquare <= exactPower;
    const ratio = isExact ? 0 : strongestAdded / this.#strongestWanted;
    // Most converters leave the carrier where the cycle has it. Where another line comes near, the report decides.
    const isPlain =
      carrier > 0 && amplitudes[carrier] > 1.01 * strongestOther && otherPower * perSquare > 1e-18;
    const sinadDb = isPlain ? 10 * Math.log10(amplitudes[carrier] / 2 / otherPower) : this.#sinadDb();
    save(sinadDb, ratio > 0 && Number.isFinite(ratio) ? 10 * Math.log10(ratio) : NaN);
  }

  /** By the report's own rules, from the squares that stand in the place of amplitudes. */
  #sinadDb(): number {
    const amplitudes = this.#amplitudes;
    const length = this.#table.codes.length;
    amplitudes[0] = 0;
    for (let k = 1; k < amplitudes.length; k += 1) amplitudes[k] = Math.sqrt(amplitudes[k]) / length;
    return carrierFigures(amplitudes, { length, range: this.#table.range }).sinadDb ?? NaN;
  }
}
