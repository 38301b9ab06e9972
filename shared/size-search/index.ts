export { usualAxes, type SizeAxes } from './axes.ts';
export { paretoOf, smallestThatMeets, type SizeFigure, type SizeLimits } from './choose.ts';
export { sizeSearch, type SizeCell } from './search.ts';
export { sizeMapOf, type SizeMap } from './size-map.ts';
