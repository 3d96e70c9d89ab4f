import uPlot from 'uplot';
import { formatClock, formatNumber } from '../../domain/time/format';
import type { Interval } from '../../domain/time/interval';
import type { CurvePanel } from '../../domain/window/curvePanels';
import { lineStyle, themeColour } from './curveStyle';
import { hourStep, tideHours } from './tideGeometry';

const PLOT_HEIGHT = 84;
const HOURS_HEIGHT = 24;
const EDGE = 8;
/** The same for every panel, so that one hour stands over the other. */
const VALUES_WIDTH = 54;
const END_WIDTH = 10;

export interface PlotFrame {
  shown: Interval;
  window: Interval;
  width: number;
  /** The lowest panel carries the hours. */
  withHours: boolean;
}

/** Samples as uPlot takes them: null where there is nothing, and after a wrap. */
export function plotData(timesMs: Float64Array, panel: CurvePanel): uPlot.AlignedData {
  const half = (panel.wrapsAt ?? Infinity) / 2;
  const lines = panel.lines.map(({ values }) =>
    Array.from(values, (value, index) => {
      const wrapped = Math.abs(value - (values[index - 1] ?? NaN)) > half;
      return Number.isFinite(value) && !wrapped ? value : null;
    }),
  );
  return [Array.from(timesMs), ...lines];
}

/** One panel on the shared axis of time; colours are read from the theme at each drawing. */
export function plotOptions(host: HTMLElement, panel: CurvePanel, frame: PlotFrame): uPlot.Options {
  const { shown, width, withHours } = frame;
  const colour = (token: string) => () => themeColour(host, token);
  const hours = tideHours(
    shown,
    hourStep({ ...shown, width, left: VALUES_WIDTH, right: width - END_WIDTH }, 44),
  );
  const grid = { stroke: colour('rule'), width: 1 };
  const shared = {
    stroke: colour('ink2'),
    font: `12px ${getComputedStyle(host).fontFamily}`,
    grid,
    ticks: { show: false },
  };
  return {
    width,
    height: PLOT_HEIGHT + 2 * EDGE + (withHours ? HOURS_HEIGHT - EDGE : 0),
    padding: [EDGE, END_WIDTH, withHours ? 0 : EDGE, 0],
    legend: { show: false },
    cursor: { show: false },
    scales: {
      x: { time: false, range: () => [shown.startMs, shown.endMs] },
      y: { range: (_plot, least, most) => valueRange(panel, least, most) },
    },
    axes: [
      {
        ...shared,
        size: withHours ? HOURS_HEIGHT : 0,
        gap: 6,
        splits: () => hours,
        values: (_plot, at) => at.map((hour) => (withHours ? formatClock(hour).slice(0, 2) : '')),
      },
      {
        ...shared,
        size: VALUES_WIDTH,
        gap: 8,
        space: 18,
        ...(panel.every ? { incrs: [panel.every] } : {}),
        values: (_plot, at, _axis, _space, step) =>
          at.map((value) => formatNumber(value, step < 1 ? 1 : 0)),
      },
    ],
    series: [
      {},
      ...panel.lines.map((line, index): uPlot.Series => {
        const { tone, dash } = lineStyle(index);
        return {
          label: line.label,
          stroke: colour(tone),
          width: 1.6,
          dash,
          pxAlign: 0,
          points: { show: false },
        };
      }),
    ],
    hooks: { drawClear: [(plot) => drawGround(plot, host, frame.window)] },
  };
}

/** Ends of the axis of values; without any value 0 to 1. */
export function valueRange(
  panel: CurvePanel,
  least: number | null,
  most: number | null,
): [number, number] {
  const { from, to, every, leastSpan = 0 } = panel;
  if (least === null || most === null) return [from ?? 0, to ?? (from ?? 0) + (every ?? 1)];
  const spare = Math.max(leastSpan - (most - least), 0) / 2;
  const [low, high] = uPlot.rangeNum(
    from ?? least - spare,
    Math.max(most + spare, (from ?? -Infinity) + 1e-6),
    0.1,
    true,
  );
  const top = every ? Math.max(Math.ceil(most / every), 1) * every : high;
  return [from ?? low!, to ?? top!];
}

/** The window as lit ground between two lines, and a line at nought where values lie on both sides. */
function drawGround(plot: uPlot, host: HTMLElement, window: Interval): void {
  const { ctx, bbox } = plot;
  const left = Math.max(plot.valToPos(window.startMs, 'x', true), bbox.left);
  const right = Math.min(plot.valToPos(window.endMs, 'x', true), bbox.left + bbox.width);
  const fill = (token: string, x: number, y: number, width: number, height: number) => {
    ctx.fillStyle = themeColour(host, token);
    ctx.fillRect(Math.round(x), Math.round(y), Math.round(width), Math.round(height));
  };
  ctx.save();
  fill('asleep', bbox.left, bbox.top, bbox.width, bbox.height);
  fill('sheet', left, bbox.top, right - left, bbox.height);
  fill('strong', left, bbox.top, uPlot.pxRatio, bbox.height);
  fill('strong', right - uPlot.pxRatio, bbox.top, uPlot.pxRatio, bbox.height);
  const { min = 0, max = 0 } = plot.scales['y']!;
  if (min < 0 && max > 0) {
    fill('rule2', bbox.left, plot.valToPos(0, 'y', true), bbox.width, uPlot.pxRatio);
  }
  ctx.restore();
}
