import type { PlotArea } from './plot-area.ts';
import type { PlotLink, PlotView } from './plot-link.ts';
import { shifted, showing } from './plot-view.ts';
import type { ReadOut, Scene } from './scene.ts';

interface CursorElements {
  surface: HTMLElement;
  overlay: HTMLElement;
  readOut: HTMLElement;
}

/**
 * The entry under the pointer or chosen by keys: a band over it, marks at its heights and the read-out above. Written
 * straight into the page; moving it draws nothing again. To assistive technology the surface is a slider whose value
 * text is the read-out.
 */
export class PlotCursor {
  private readonly elements: CursorElements;
  private readonly scene: Scene;
  private readonly link: PlotLink;
  private readonly area: PlotArea;
  private readonly band = document.createElement('div');
  private readonly marks: HTMLElement[] = [];

  constructor(elements: CursorElements, scene: Scene, link: PlotLink, area: PlotArea) {
    this.elements = elements;
    this.scene = scene;
    this.link = link;
    this.area = area;
    this.band.className = 'plot-band';
    elements.overlay.append(this.band);
  }

  pointAt(px: number): void {
    const [first, last] = this.scene.items();
    const item = this.scene.itemAt(this.area.valueAtX(px));
    this.link.setCursor(Math.min(last, Math.max(first, item)));
  }

  /** Place of the cursor on x, where there is one in sight. */
  middle(): number | null {
    const item = this.link.cursor();
    if (item === null) return null;
    const [from, to] = this.scene.spanOf(item);
    return to < this.area.from || from > this.area.to ? null : (from + to) / 2;
  }

  onKey(event: KeyboardEvent, view: PlotView): boolean {
    const [first, last] = this.scene.items();
    if (event.ctrlKey || event.metaKey || event.altKey) return false;
    if (event.shiftKey && (event.key === 'ArrowLeft' || event.key === 'ArrowRight')) {
      const quarter = (view.to - view.from) / 4;
      if (this.link.view() !== null)
        this.link.setView(shifted(this.scene, view, event.key === 'ArrowLeft' ? -quarter : quarter));
      return true;
    }
    const here = this.link.cursor() ?? Math.max(first, this.scene.itemAt(view.from) - 1);
    const page = Math.max(1, Math.round((last - first) / 16));
    const goal = {
      ArrowLeft: here - 1,
      ArrowRight: here + 1,
      PageDown: here - page,
      PageUp: here + page,
      Home: first,
      End: last,
    }[event.key];
    if (goal === undefined) return false;
    const item = Math.min(last, Math.max(first, goal));
    if (this.link.view() !== null) this.link.setView(showing(this.scene, view, item));
    this.link.setCursor(item);
    return true;
  }

  readonly place = (): void => {
    const { scene, area, band } = this;
    const { surface, overlay, readOut } = this.elements;
    const [first, last] = scene.items();
    say(surface, 'aria-valuemin', String(first));
    say(surface, 'aria-valuemax', String(last));
    const item = this.link.cursor();
    if (item === null || item < first || item > last) {
      overlay.classList.remove('has-cursor');
      say(surface, 'aria-valuenow', String(first));
      say(surface, 'aria-valuetext', 'nothing chosen');
      readOut.classList.remove('has-cursor');
      return;
    }

    const said = scene.readOut(item);
    write(readOut, said);
    say(surface, 'aria-valuenow', String(item));
    say(surface, 'aria-valuetext', said.map(({ label, value }) => `${label} ${value}`).join(', '));

    const [from, to] = scene.spanOf(item);
    const left = area.x(from) - area.left;
    const width = Math.max(1, area.x(to) - area.left - left);
    const isInSight = left + width > 0 && left < area.width;
    overlay.classList.toggle('has-cursor', isInSight);
    readOut.classList.add('has-cursor');
    band.style.width = `${width}px`;
    band.style.transform = `translateX(${left}px)`;
    scene.marksAt(item).forEach(({ x, y }, index) => {
      const mark = (this.marks[index] ??= this.newMark(index));
      mark.style.transform = `translate(${area.x(x) - area.left}px, ${area.y(y) - area.top}px)`;
    });
  };

  destroy(): void {
    this.band.remove();
    this.marks.forEach((mark) => {
      mark.remove();
    });
  }

  private newMark(index: number): HTMLElement {
    const mark = document.createElement('div');
    mark.className = `plot-mark plot-mark-${index}`;
    this.elements.overlay.append(mark);
    return mark;
  }
}

/** Writing the same again would make the browser look through its styles again. */
function say(surface: HTMLElement, name: string, value: string) {
  if (surface.getAttribute(name) !== value) surface.setAttribute(name, value);
}

/** Fills the read-out's cells, making only those that are not there yet. */
function write(readOut: HTMLElement, said: readonly ReadOut[]) {
  while (readOut.children.length > said.length) readOut.lastElementChild?.remove();
  said.forEach(({ label, value }, index) => {
    let cell = readOut.children.item(index);
    if (!cell) {
      cell = document.createElement('span');
      cell.append(document.createElement('span'), ' ', document.createElement('b'));
      readOut.append(cell);
    }
    const [name, , figure] = cell.childNodes;
    if (name.textContent !== label) name.textContent = label;
    if (figure.textContent !== value) figure.textContent = value;
  });
}
