import type { ReactNode, SVGProps } from 'react';

export type Icon = (props: SVGProps<SVGSVGElement>) => ReactNode;

/** One pen for all: a 20-unit square, 1.6 units wide, mitred like cut stone. */
function draw(strokes: string, fills?: string): Icon {
  return function IconDrawing(props) {
    return (
      <svg viewBox="0 0 20 20" width="20" height="20" aria-hidden="true" focusable="false" {...props}>
        {fills && <path d={fills} fill="currentColor" />}
        {strokes && (
          <path
            d={strokes}
            fill="none"
            stroke="currentColor"
            strokeWidth="1.6"
            strokeLinecap="square"
            strokeMiterlimit="10"
          />
        )}
      </svg>
    );
  };
}

/** The application's own drawings. */
export const icons = {
  play: draw('', 'M5 3v14l12-7z'),
  stop: draw('', 'M4.5 4.5h11v11h-11z'),
  undo: draw('M7.5 3.5 3.5 7.5l4 4M4 7.5h8.5v8.5H8'),
  redo: draw('M12.5 3.5l4 4-4 4M16 7.5H7.5v8.5H12'),
  copy: draw('M7 7h9.5v9.5H7zM13 4V3.5H3.5V13H4'),
  download: draw('M10 3v9M6 8.5l4 4 4-4M3.5 13v4h13v-4'),
  upload: draw('M10 13V4M6 7.5l4-4 4 4M3.5 13v4h13v-4'),
  share: draw('M11 3.5h5.5V9M16 4l-7.5 7.5M8 5H3.5v11.5H15V12'),
  link: draw('M8 6H3.5v8H8M12 6h4.5v8H12M7 10h6'),
  save: draw('M3.5 16.5v-13h10l3 3v10zM7 4v4h5V4M6.5 16v-4h7v4'),
  add: draw('M10 4v12M4 10h12'),
  remove: draw('M4 10h12'),
  close: draw('M5 5l10 10M15 5 5 15'),
  delete: draw('M4 6h12M8 5.5v-2h4v2M5.5 6.5l.8 10h7.4l.8-10M8.5 9.5v4M11.5 9.5v4'),
  chevron: draw('M5 7.5l5 5 5-5'),
  question: draw('M7 7.2V5.8L8.4 4h3.4L13 5.6v2L10 10v2.6', 'M8.9 14.9h2.2v2.2H8.9z'),
  drag: draw('', 'M6 4h3v3H6zm5 0h3v3h-3zM6 8.5h3v3H6zm5 0h3v3h-3zM6 13h3v3H6zm5 0h3v3h-3z'),
  zoomIn: draw('M3.5 8.5a5 5 0 1 0 10 0 5 5 0 1 0-10 0M12.5 12.5l4 4M6.5 8.5h4M8.5 6.5v4'),
  zoomOut: draw('M3.5 8.5a5 5 0 1 0 10 0 5 5 0 1 0-10 0M12.5 12.5l4 4M6.5 8.5h4'),
  zoomAll: draw('M3 4v12M17 4v12M6 10h8M8 7.5 5.5 10 8 12.5M12 7.5l2.5 2.5-2.5 2.5'),
  sun: draw(
    'M6.5 10a3.5 3.5 0 1 0 7 0 3.5 3.5 0 1 0-7 0M10 2.5v1M10 16.5v1M2.5 10h1M16.5 10h1M4.7 4.7l.7.7M14.6 14.6l.7.7M15.3 4.7l-.7.7M5.4 14.6l-.7.7',
  ),
  moon: draw('M12.5 3.5a7 7 0 1 0 4 9.5 6 6 0 0 1-4-9.5z'),
  system: draw('M3.5 4h13v9.5h-13zM7 16.5h6M10 14v2', 'M10 4h6.5v9.5H10z'),
  caution: draw('M10 3.2 17.5 16.5h-15zM10 8v3.5', 'M9.1 13.2h1.8V15H9.1z'),
  fault: draw('M6.8 3h6.4L17 6.8v6.4L13.2 17H6.8L3 13.2V6.8zM10 6v5', 'M9.1 12.8h1.8v1.8H9.1z'),
  good: draw('M4 10.5l4 4 8-9'),
  more: draw('', 'M3.5 8.5h3v3h-3zm5 0h3v3h-3zm5 0h3v3h-3z'),
  volume: draw('M3.5 7.5v5h3l4 4v-13l-4 4zM13.5 7.5v5M16.5 5v10'),
  wave: draw('M2.5 10C4.5 3.5 8 3.5 10 10s5.5 6.5 7.5 0'),
  steps: draw('M2.5 5H7v4h4v4h4v3.5h2.5'),
  table: draw('M3.5 4h13v12h-13zM3.5 8h13M3.5 12h13M9 8v8'),
  file: draw('M5 3.5h6.5l4 4v9H5zM11 4v4h4'),
  arrowUp: draw('M10 16.5v-12M5.5 8.5l4.5-4.5 4.5 4.5'),
  arrowDown: draw('M10 3.5v12M5.5 11.5l4.5 4.5 4.5-4.5'),
  person: draw('M6.5 6.5a3.5 3.5 0 1 0 7 0 3.5 3.5 0 1 0-7 0M3.5 17v-3l3-2h7l3 2v3'),
  team: draw(
    'M4 6a2.5 2.5 0 1 0 5 0 2.5 2.5 0 1 0-5 0M11.5 7a2 2 0 1 0 4 0 2 2 0 1 0-4 0M2.5 16v-3l2-2h4l2 2v3M13 11h2l2.5 2v3',
  ),
  leave: draw('M8 3.5H3.5v13H8M8 10h8.5M13 6.5l3.5 3.5-3.5 3.5'),
  mail: draw('M3 5h14v10.5H3zM3.5 5.5 10 11l6.5-5.5'),
  search: draw('M3.5 8.5a5 5 0 1 0 10 0 5 5 0 1 0-10 0M12.5 12.5l4 4'),
  edit: draw('M4 16v-3l8.5-8.5 3 3L7 16zM10.5 6.5l3 3'),
  archive: draw('M3 4h14v4H3zM4.5 8.5v8h11v-8M8 11.5h4'),
  hourglass: draw('M5 3.5h10M5 16.5h10M6 4v3l4 3 4-3V4M6 16v-3l4-3 4 3v3'),
  speaker: draw('M3.5 7.5v5h3l4 4v-13l-4 4z'),
} satisfies Record<string, Icon>;
