/** Where values lie on a drawing: the rectangle inside the axes, and the two straight scales across it. */
export class PlotArea {
  left = 0;
  top = 0;
  width = 1;
  height = 1;
  /** Drawing units a CSS pixel. */
  unit = 1;
  /** Range of x from the left edge to the right one. */
  from = 0;
  to = 1;
  /** Range of y from the bottom edge to the top one. */
  low = 0;
  high = 1;

  place(left: number, top: number, width: number, height: number, unit: number) {
    this.left = left;
    this.top = top;
    this.width = width;
    this.height = height;
    this.unit = unit;
  }

  scale(from: number, to: number, low: number, high: number) {
    this.from = from;
    this.to = to;
    this.low = low;
    this.high = high;
  }

  get right() {
    return this.left + this.width;
  }

  get bottom() {
    return this.top + this.height;
  }

  x(value: number): number {
    return this.left + ((value - this.from) / (this.to - this.from)) * this.width;
  }

  y(value: number): number {
    return this.top + ((this.high - value) / (this.high - this.low)) * this.height;
  }

  valueAtX(x: number): number {
    return this.from + ((x - this.left) / this.width) * (this.to - this.from);
  }

  valueAtY(y: number): number {
    return this.high - ((y - this.top) / this.height) * (this.high - this.low);
  }
}
