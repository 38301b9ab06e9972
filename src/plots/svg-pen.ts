import { wordsPx, type Pen, type TextStyle } from './pen.ts';

const anchors = { left: 'start', center: 'middle', right: 'end' } as const;
/** From the middle line of the letters down to their base line, in parts of the size. */
const baseline = 0.35;

/** A pen that writes SVG. Coordinates keep two decimals; colours and faces are written out, so a file stands alone. */
export class SvgPen implements Pen {
  private readonly parts: string[] = [];
  private path: string[] = [];
  private clips = 0;
  private readonly faces: { text: string; figures: string };

  constructor(faces: { text: string; figures: string }) {
    this.faces = faces;
  }

  begin() {
    this.path = [];
  }

  move(x: number, y: number) {
    this.path.push(`M${short(x)} ${short(y)}`);
  }

  line(x: number, y: number) {
    this.path.push(`L${short(x)} ${short(y)}`);
  }

  close() {
    this.path.push('Z');
  }

  stroke(color: string, width: number, dash: readonly number[] = []) {
    const dashes = dash.length > 0 ? ` stroke-dasharray="${dash.join(' ')}"` : '';
    this.parts.push(
      `<path d="${this.path.join('')}" fill="none" stroke="${escaped(color)}" stroke-width="${short(width)}"${dashes}/>`,
    );
  }

  fill(color: string) {
    this.parts.push(`<path d="${this.path.join('')}" fill="${escaped(color)}"/>`);
  }

  rect(x: number, y: number, width: number, height: number, color: string) {
    this.parts.push(
      `<rect x="${short(x)}" y="${short(y)}" width="${short(width)}" height="${short(height)}" fill="${escaped(color)}"/>`,
    );
  }

  disc(x: number, y: number, radius: number, color: string) {
    this.parts.push(
      `<circle cx="${short(x)}" cy="${short(y)}" r="${short(radius)}" fill="${escaped(color)}"/>`,
    );
  }

  text(words: string, x: number, y: number, style: TextStyle) {
    const face = style.face === 'figures' ? this.faces.figures : this.faces.text;
    const stretch = style.face === 'figures' ? ' font-stretch="condensed"' : '';
    const halo = style.halo
      ? ` stroke="${escaped(style.halo)}" stroke-width="4" paint-order="stroke" stroke-linejoin="round"`
      : '';
    this.parts.push(
      `<text x="${short(x)}" y="${short(y + wordsPx * baseline)}" fill="${escaped(style.color)}"${halo} ` +
        `font-family="${escaped(face)}" font-size="${wordsPx}" font-weight="${style.weight ?? 400}"${stretch} ` +
        `text-anchor="${anchors[style.align ?? 'left']}">${escaped(words)}</text>`,
    );
  }

  clip(x: number, y: number, width: number, height: number) {
    const id = `clip-${++this.clips}`;
    this.parts.push(
      `<clipPath id="${id}"><rect x="${short(x)}" y="${short(y)}" width="${short(width)}" height="${short(height)}"/></clipPath>`,
      `<g clip-path="url(#${id})">`,
    );
  }

  unclip() {
    this.parts.push('</g>');
  }

  /** The whole file. */
  document(width: number, height: number, title: string, description: string): string {
    return (
      `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}" role="img">\n` +
      `<title>${escaped(title)}</title>\n<desc>${escaped(description)}</desc>\n${this.parts.join('\n')}\n</svg>\n`
    );
  }
}

function short(number: number): string {
  return String(Math.round(number * 100) / 100);
}

function escaped(text: string): string {
  return text.replace(
    /[&<>"]/gu,
    (sign) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[sign] ?? sign,
  );
}
