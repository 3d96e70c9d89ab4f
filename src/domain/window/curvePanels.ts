import { formatDoppler, formatNumber } from '../time/format';
import type { FigureId } from './figures';
import { qualityFigure, qualityOfMargin } from './quality';
import type { WindowCurves } from './curves';

/** One line of a panel. */
export interface PanelLine {
  label: string;
  values: Float64Array;
}

/** Curves with one axis of values. */
export interface CurvePanel {
  figure: FigureId;
  title: string;
  unit: string;
  lines: PanelLine[];
  /** For people, without the unit. */
  format: (value: number) => string;
  /** Ends of the axis that hold whatever the values are. */
  from?: number;
  to?: number;
  /** The axis is marked at multiples of this. */
  every?: number;
  /** The axis reaches at least so far, lest a flat curve look lively. */
  leastSpan?: number;
  /** A value after which the line begins again at 0, as an angle does at 180. */
  wrapsAt?: number;
}

/** The panels of a window from top to bottom, in words. */
export function curvePanels(
  curves: WindowCurves,
  callSigns: readonly string[],
  frequencyMhz: number,
): CurvePanel[] {
  const hertz = (value: number) =>
    Number.isFinite(value) ? formatDoppler(value, frequencyMhz).replace(/\u00a0Hz$/, '') : '–';
  const line = (values: Float64Array, index: number) => ({ label: callSigns[index]!, values });
  const { pair } = curves;
  const panels: CurvePanel[] = [
    {
      figure: 'elevation',
      title: 'Elevation',
      unit: '°',
      lines: curves.elevationDeg.map(line),
      format: (value) => formatNumber(value, 1),
      from: 0,
      every: 30,
    },
    {
      figure: 'degradation',
      title: 'Degradation',
      unit: 'dB',
      lines: [{ label: 'Path', values: curves.degradationDb }],
      format: (value) => formatNumber(value, 1),
      leastSpan: 1,
    },
    {
      figure: 'doppler',
      title: 'Doppler',
      unit: 'Hz',
      lines: [
        ...curves.ownEchoHz.map((values, index) => ({
          label: `${callSigns[index]!} own echo`,
          values,
        })),
        ...(pair ? [{ label: 'Mutual', values: pair.mutualHz }] : []),
      ],
      format: hertz,
    },
  ];
  if (!pair) return panels;
  const [first, second] = callSigns as [string, string];
  panels.push(
    {
      figure: 'spread',
      title: 'Spread',
      unit: 'Hz',
      lines: [{ label: 'Limb to limb', values: pair.spreadHz }],
      format: (value) => formatNumber(value, 1),
      from: 0,
    },
    {
      figure: 'polarization',
      title: 'Polarisation offset',
      unit: '°',
      lines: [{ label: 'Between the horizontals', values: pair.polarizationOffsetDeg }],
      format: (value) => formatNumber(value),
      from: 0,
      to: 180,
      every: 90,
      wrapsAt: 180,
    },
  );
  if (pair.marginDb) {
    panels.push({
      figure: 'margin',
      title: 'Margin',
      unit: 'dB',
      lines: [
        { label: `${first} to ${second}`, values: pair.marginDb[0] },
        { label: `${second} to ${first}`, values: pair.marginDb[1] },
      ],
      format: (value) => (Number.isFinite(value) ? qualityFigure(qualityOfMargin(value)) : '–'),
      leastSpan: 3,
    });
  }
  return panels;
}

/** Straight between two samples; at a wrap the nearer one. NaN beyond the ends and beside a gap. */
export function valueAt(
  timesMs: Float64Array,
  values: Float64Array,
  atMs: number,
  wrapsAt = Infinity,
): number {
  const first = timesMs[0];
  const second = timesMs[1];
  if (first === undefined || second === undefined) return NaN;
  const position = (atMs - first) / (second - first);
  const index = Math.floor(position);
  const share = position - index;
  const before = values[index] ?? NaN;
  if (share === 0) return before;
  const after = values[index + 1] ?? NaN;
  if (Math.abs(after - before) > wrapsAt / 2) return share < 0.5 ? before : after;
  return before + share * (after - before);
}
