import { formatClock, formatDay, formatHoursMinutes } from '../../domain/time/format';
import {
  DAY_MS,
  HOUR_MS,
  intersectIntervals,
  overlaps,
  subtractIntervals,
} from '../../domain/time/interval';
import { qualityFigure, type QualityStep } from '../../domain/window/quality';
import type { TakenSlot } from '../../domain/window/searchData';
import type { RasterLayers, RasterStation } from '../chart/rasterView';

interface Props {
  stations: RasterStation[];
  layers: RasterLayers;
  taken?: TakenSlot[] | undefined;
  chosen?: number | null | undefined;
  onChoose?: ((index: number, atMs: number | null) => void) | undefined;
}

const HEIGHT = 22;

/** The raster for narrow screens: a list of the days that have something, each with one strip of 24 hours UTC. */
export function DayStrips({ stations, layers, taken = [], chosen, onChoose }: Props) {
  const rows: { from: number; to: number; empty: boolean }[] = [];
  layers.days.forEach((day, index) => {
    const empty = day.usableMs === 0;
    const last = rows.at(-1);
    if (empty && last?.empty) last.to = index;
    else rows.push({ from: index, to: index, empty });
  });
  return (
    <div className="strips">
      <p className="strips__axis" aria-hidden="true">
        {['00', '06', '12', '18', '24'].map((hour) => (
          <span key={hour}>{hour}</span>
        ))}
      </p>
      <ul>
        {rows.map(({ from, to, empty }) => {
          const day = layers.days[from]!;
          if (empty) {
            const range =
              from === to
                ? formatDay(day.startMs)
                : `${formatDay(day.startMs)} – ${formatDay(layers.days[to]!.startMs)}`;
            return (
              <li key={day.startMs} className="strips__none">
                <span>{range}</span>
                <span>no window</span>
              </li>
            );
          }
          const today = { startMs: day.startMs, endMs: day.startMs + DAY_MS };
          const indices = layers.windows.flatMap((window, index) =>
            overlaps(window, today) ? [index] : [],
          );
          return (
            <li key={day.startMs} className="strips__day">
              <div className="strips__words">
                <strong>{formatDay(day.startMs)}</strong>
                <span>{formatHoursMinutes(day.usableMs)} h</span>
                {day.best ? (
                  <span>
                    <strong>{qualityFigure(day.best)}</strong> dB, {day.best.step}
                  </span>
                ) : null}
              </div>
              <Strip startMs={day.startMs} stations={stations} layers={layers} taken={taken} />
              {onChoose ? (
                <div className="strips__windows">
                  {indices.map((index) => {
                    const window = layers.windows[index]!;
                    return (
                      <button
                        key={window.startMs}
                        type="button"
                        aria-pressed={index === chosen}
                        onClick={() => onChoose(index, null)}
                      >
                        {formatClock(window.startMs)}–{formatClock(window.endMs)}
                      </button>
                    );
                  })}
                </div>
              ) : null}
            </li>
          );
        })}
      </ul>
    </div>
  );
}

function Strip({
  startMs,
  stations,
  layers,
  taken,
}: {
  startMs: number;
  stations: RasterStation[];
  layers: RasterLayers;
  taken: TakenSlot[];
}) {
  const today = [{ startMs, endMs: startMs + DAY_MS }];
  const hour = (atMs: number) => Math.round(((atMs - startMs) / HOUR_MS) * 1000) / 1000;
  const boxes = (
    intervals: readonly { startMs: number; endMs: number }[],
    y: number,
    height: number,
  ) =>
    intersectIntervals(intervals, today)
      .map(
        (piece) =>
          `M${hour(piece.startMs)} ${y}H${hour(piece.endMs)}v${height}H${hour(piece.startMs)}z`,
      )
      .join('');
  const steps = (bands: readonly { startMs: number; endMs: number; step: QualityStep }[]) => [
    ...new Set(bands.filter((band) => overlaps(band, today[0]!)).map((band) => band.step)),
  ];
  const half = HEIGHT / Math.min(2, Math.max(1, stations.length));
  return (
    <svg
      className="chart strip"
      viewBox={`0 0 24 ${HEIGHT}`}
      preserveAspectRatio="none"
      aria-hidden="true"
    >
      {stations.slice(0, 2).map((station, index) => (
        <path
          key={station.callSign}
          className="ground"
          d={
            station.usable
              ? boxes(subtractIntervals(today, station.usable), index * half, half)
              : ''
          }
        />
      ))}
      <path className="strip__grid" d={`M6 0v${HEIGHT}M12 0v${HEIGHT}M18 0v${HEIGHT}`} />
      <path
        className="strip__hidden"
        d={intersectIntervals(layers.hidden, today)
          .map((piece) => `M${hour(piece.startMs)} ${HEIGHT / 2}H${hour(piece.endMs)}`)
          .join('')}
      />
      {steps(layers.outside).map((step) => (
        <path
          key={`outside-${step}`}
          className={`band band--${step}`}
          d={boxes(
            layers.outside.filter((band) => band.step === step),
            HEIGHT / 2 - 1.5,
            3,
          )}
        />
      ))}
      {steps(layers.bands).map((step) => (
        <path
          key={step}
          className={`band band--${step}`}
          d={boxes(
            layers.bands.filter((band) => band.step === step),
            3,
            HEIGHT - 6,
          )}
        />
      ))}
      <path
        className="strip__edge"
        d={boxes(
          layers.windows.filter((_, at) => layers.windowQuality[at]!.step !== 'below'),
          3,
          HEIGHT - 6,
        )}
      />
      <path className="strip__taken" d={boxes(taken, 1, HEIGHT - 2)} />
    </svg>
  );
}
