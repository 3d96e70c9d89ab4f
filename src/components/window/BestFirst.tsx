import { memo } from 'react';
import {
  formatClock,
  formatDay,
  formatDuration,
  formatLocal,
  formatNumber,
} from '../../domain/time/format';
import type { WindowLayers } from '../../domain/window/layers';
import { FigureLabel } from '../ui/FigureLabel';
import { QUALITY_NAMES } from '../../domain/window/quality';
import { rankingSentence } from '../../domain/window/ranking';
import type { ChosenStation } from '../../domain/window/searchData';
import { QualityChip } from '../ui/Quality';

export interface ListedWindow {
  /** Index among the windows in order of time. */
  index: number;
  why: string;
  /** Where the Moon stands at the best moment, by station. */
  look: { azimuthDeg: number; elevationDeg: number }[];
}

interface Props {
  layers: Pick<WindowLayers, 'windows' | 'windowQuality' | 'judge'>;
  listed: ListedWindow[];
  stations: Pick<ChosenStation, 'callSign' | 'timeZone'>[];
  chosen?: number | null | undefined;
  onChoose?: ((index: number) => void) | undefined;
}

/** Windows in order of worth; the raster's twin for readers and keyboards. Works as a plain table too. */
export const BestFirst = memo(function BestFirst({
  layers,
  listed,
  stations,
  chosen,
  onChoose,
}: Props) {
  const { basis } = layers.judge;
  const clocks = stations.slice(0, 2).filter((station) => station.timeZone !== null);
  const looks = stations.slice(0, 2);
  return (
    <section aria-labelledby="best-first">
      <div className="best__head">
        <h2 id="best-first">Best first</h2>
        <p className="label">{rankingSentence(basis)} Times UTC.</p>
      </div>
      <table className="table--cards best table">
        <thead>
          <tr>
            <th scope="col" className="figure">
              <span className="sr-only">Rank</span>
            </th>
            <th scope="col">Day</th>
            <th scope="col" className="figure">
              From–to
            </th>
            <th scope="col" className="figure">
              Length
            </th>
            <th scope="col" className="figure">
              Best
            </th>
            <th scope="col">
              <FigureLabel figure={basis}>{QUALITY_NAMES[basis]}</FigureLabel>, dB
            </th>
            {clocks.map((station) => (
              <th key={station.callSign} scope="col" className="figure">
                {station.callSign}
                <br />
                clock
              </th>
            ))}
            {looks.map((station) => (
              <th key={station.callSign} scope="col" className="figure">
                {station.callSign}
                <br />
                az / el
              </th>
            ))}
            <th scope="col">Why</th>
          </tr>
        </thead>
        <tbody>
          {listed.map(({ index, why, look }, rank) => {
            const window = layers.windows[index]!;
            const day = formatDay(window.startMs);
            const endDay = formatDay(window.endMs);
            return (
              <tr
                key={window.startMs}
                className={index === chosen ? 'best__chosen' : undefined}
                onClick={onChoose ? () => onChoose(index) : undefined}
              >
                <td className="figure label best__rank">{rank + 1}</td>
                <th scope="row">
                  {onChoose ? (
                    <button
                      type="button"
                      className="best__day"
                      aria-pressed={index === chosen}
                      onClick={(event) => {
                        event.stopPropagation();
                        onChoose(index);
                      }}
                    >
                      {day}
                    </button>
                  ) : (
                    day
                  )}
                </th>
                <td className="figure best__range">
                  {formatClock(window.startMs)}–{formatClock(window.endMs)}
                  {endDay === day ? null : <span className="label"> {endDay.slice(0, 3)}</span>}
                </td>
                <td className="figure best__length" data-label="Length">
                  {formatDuration(window.endMs - window.startMs)}
                </td>
                <td className="figure best__moment" data-label="Best">
                  {formatClock(window.best.timeMs)}
                </td>
                <td className="best__quality">
                  <QualityChip quality={layers.windowQuality[index]!} />
                </td>
                {clocks.map((station) => (
                  <td
                    key={station.callSign}
                    className="figure best__clock"
                    data-label={station.callSign}
                  >
                    {formatLocal(window.best.timeMs, station.timeZone!)}
                  </td>
                ))}
                {looks.map((station, at) => (
                  <td key={station.callSign} className="figure best__look">
                    {formatNumber(look[at]!.azimuthDeg)}° / {formatNumber(look[at]!.elevationDeg)}°
                  </td>
                ))}
                <td className="best__why">{why}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </section>
  );
});
