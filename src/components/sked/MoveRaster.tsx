import { useCallback } from 'react';
import { startInWindow, type RasterMonth } from '../../domain/sked/rasterMonth';
import type { Interval } from '../../domain/time/interval';
import { MonthRaster } from '../chart/MonthRaster';
import { RasterLegend } from '../chart/RasterLegend';
import { DayStrips } from '../window/DayStrips';
import { useWidth } from '../window/useWidth';

const NARROW = 520;

interface Props {
  month: RasterMonth;
  /** The slot as it stands. */
  standing: Interval;
  lengthMs: number;
  /** Page of the move; the start that is pressed comes as its query. */
  movePath: string;
}

/** The common windows of the coming weeks; pressing one puts its time into the form. */
export default function MoveRaster({ month, standing, lengthMs, movePath }: Props) {
  const [box, width] = useWidth<HTMLDivElement>();
  const { layers, nowMs, stations } = month;
  const choose = useCallback(
    (index: number, atMs: number | null) => {
      const startMs = startInWindow(layers.windows[index]!, lengthMs, atMs, nowMs);
      const query = new URLSearchParams({ start: new Date(startMs).toISOString() });
      window.location.assign(`${movePath}?${query.toString()}#time`);
    },
    [layers, lengthMs, movePath, nowMs],
  );
  return (
    <div ref={box} className="min-w-0">
      {width === 0 ? null : width < NARROW ? (
        <DayStrips stations={stations} layers={layers} taken={month.taken} onChoose={choose} />
      ) : (
        <>
          <MonthRaster
            fromMs={month.fromMs}
            days={month.days}
            width={width}
            stations={stations}
            layers={layers}
            taken={month.taken}
            nowMs={nowMs}
            slot={standing}
            label={`Common windows of ${stations.map(({ callSign }) => callSign).join(' and ')} for ${month.days} days, one row a day. Press one to choose its time.`}
            onChoose={choose}
          />
          <RasterLegend
            basis={layers.windowQuality[0]?.basis ?? 'degradation'}
            callSigns={stations.map(({ callSign }) => callSign)}
            hoursKnown={stations.some(({ usable }) => usable !== undefined)}
            countsHours
            skeds
          />
        </>
      )}
    </div>
  );
}
