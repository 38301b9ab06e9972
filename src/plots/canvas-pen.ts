import { fontOf, type Pen, type TextStyle } from './pen.ts';

/** A pen on a canvas. `unit` is canvas pixels a CSS pixel. */
export class CanvasPen implements Pen {
  context: CanvasRenderingContext2D;
  unit: number;
  faces: { text: string; figures: string };

  constructor(context: CanvasRenderingContext2D, unit: number, faces: { text: string; figures: string }) {
    this.context = context;
    this.unit = unit;
    this.faces = faces;
  }

  begin() {
    this.context.beginPath();
  }

  move(x: number, y: number) {
    this.context.moveTo(x, y);
  }

  line(x: number, y: number) {
    this.context.lineTo(x, y);
  }

  close() {
    this.context.closePath();
  }

  stroke(color: string, width: number, dash: readonly number[] = noDash) {
    const { context } = this;
    context.strokeStyle = color;
    context.lineWidth = width;
    context.lineJoin = 'miter';
    context.miterLimit = 2;
    context.setLineDash(dash as number[]);
    context.stroke();
  }

  fill(color: string) {
    this.context.fillStyle = color;
    this.context.fill();
  }

  rect(x: number, y: number, width: number, height: number, color: string) {
    this.context.fillStyle = color;
    this.context.fillRect(x, y, width, height);
  }

  disc(x: number, y: number, radius: number, color: string) {
    this.context.beginPath();
    this.context.arc(x, y, radius, 0, 2 * Math.PI);
    this.fill(color);
  }

  text(words: string, x: number, y: number, style: TextStyle) {
    const { context } = this;
    context.font = fontOf(style, this.faces, this.unit);
    context.textAlign = style.align ?? 'left';
    context.textBaseline = 'middle';
    if (style.halo) {
      context.strokeStyle = style.halo;
      context.lineWidth = 4 * this.unit;
      context.lineJoin = 'round';
      context.setLineDash(noDash);
      context.strokeText(words, x, y);
    }
    context.fillStyle = style.color;
    context.fillText(words, x, y);
  }

  clip(x: number, y: number, width: number, height: number) {
    this.context.save();
    this.context.beginPath();
    this.context.rect(x, y, width, height);
    this.context.clip();
  }

  unclip() {
    this.context.restore();
  }
}

const noDash: number[] = [];
