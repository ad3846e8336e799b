/** Where the parts of a plot lie for a given size and view. */
import { axisTicks, createScale, type AxisScale, type AxisSpec, type Tick } from './axis';
import type { PlotSpec, Viewport } from './plot-spec';

export interface PlotLayout {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly top: number;
  readonly innerWidth: number;
  readonly innerHeight: number;
  readonly x: AxisScale;
  readonly y: AxisScale;
  readonly xAxis: AxisSpec;
  readonly yAxis: AxisSpec;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
}

const TOP = 14;
const RIGHT = 18;
const BOTTOM = 44;
/** Width of a figure of the tick labels at their size of 12 px. */
const FIGURE_WIDTH = 7.2;
const LABEL_ROOM = 34;

export function layoutPlot(
  spec: PlotSpec,
  width: number,
  height: number,
  viewport: Viewport | null,
): PlotLayout {
  const xAxis = viewport ? { ...spec.x, domain: viewport.x } : spec.x;
  const yAxis = viewport ? { ...spec.y, domain: viewport.y } : spec.y;
  const innerHeight = Math.max(20, height - TOP - BOTTOM);
  const yTicks = axisTicks(yAxis, Math.max(2, Math.floor(innerHeight / 44)));
  const longest = yTicks.reduce((length, tick) => Math.max(length, tick.label.length), 1);
  const left = LABEL_ROOM + longest * FIGURE_WIDTH;
  const innerWidth = Math.max(20, width - left - RIGHT);
  return {
    width,
    height,
    left,
    top: TOP,
    innerWidth,
    innerHeight,
    xAxis,
    yAxis,
    x: createScale(xAxis, [left, left + innerWidth]),
    y: createScale(yAxis, [TOP + innerHeight, TOP]),
    xTicks: axisTicks(xAxis, Math.max(2, Math.floor(innerWidth / 84))),
    yTicks,
  };
}
