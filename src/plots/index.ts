export { CyclePlot, type CyclePlotProps, type PlotPoint } from './cycle-plot.tsx';
export type { CycleData } from './cycle-scene.ts';
export { ErrorPlot, type ErrorPlotProps } from './error-plot.tsx';
export { createPlotLink, PlotLinkProvider, type PlotLink } from './plot-link.ts';
export { SpectrumPlot, type SpectrumPlotProps } from './spectrum-plot.tsx';
export type { SpectrumData } from './spectrum-scene.ts';
export { StairDrawing, type StairDrawingProps } from './stair-drawing.tsx';
