import { useMemo, type ReactNode } from 'react';
import { bandById } from '../../domain/station/bands';
import { formatClock, formatDay, formatNumber } from '../../domain/time/format';
import { overlaps, type Interval } from '../../domain/time/interval';
import { moonPhase } from '../../domain/window/moonPhase';
import { qualityAt } from '../../domain/window/qualityBands';
import { windowSentence } from '../../domain/window/sentences';
import { MoonDomes } from '../chart/MoonDomes';
import { TwinTide } from '../chart/TwinTide';
import type { Answer } from './answer';
import { CursorTable } from './CursorTable';
import { detailView } from './detailView';
import { useWidth } from './useWidth';

interface Props {
  answer: Answer;
  index: number;
  cursorMs: number;
  slot: Interval | null;
  onCursor: (atMs: number) => void;
  onSlot: (slot: Interval) => void;
  children: ReactNode;
}

/** One window: both skies, the tide of elevations, and the figures at the hand. */
export function WindowDetail(props: Props) {
  const { answer, index, cursorMs, slot, onCursor, onSlot } = props;
  const { question, stations, layers, taken, degreesOf } = answer;
  const [element, width] = useWidth<HTMLDivElement>();
  const window = layers.windows[index]!;
  const quality = layers.windowQuality[index]!;
  const { startMs, endMs } = window;
  const view = useMemo(() => detailView({ startMs, endMs }, stations), [startMs, endMs, stations]);
  const looking = useMemo(
    () =>
      stations.map((station, at) => {
        const asked = question.lowestDeg[at] ?? null;
        return asked === null
          ? station
          : { ...station, sky: { ...station.sky, elevationFromDeg: asked } };
      }),
    [stations, question.lowestDeg],
  );
  const inView = <T extends Interval>(items: readonly T[]) =>
    items.filter((item) => overlaps(item, view.shown));
  const sameDay = formatDay(startMs) === formatDay(endMs);
  return (
    <section className="detail" aria-labelledby="detail-title" ref={element}>
      <div className="detail__head">
        <div>
          <h2 id="detail-title" className="detail__title">
            {formatDay(startMs)},{' '}
            <span className="whitespace-nowrap">
              {formatClock(startMs)}–{formatClock(endMs)}
            </span>{' '}
            <span className="detail__zone">
              {sameDay ? '' : `${formatDay(endMs).slice(0, 3)} `}UTC
            </span>
          </h2>
          <p>{windowSentence(window, degreesOf)}</p>
        </div>
        <p className={`detail__chip chip--${quality.step}`}>
          <strong>{formatNumber(quality.db, 1)}</strong> dB, {quality.step}
        </p>
      </div>
      {width > 0 ? (
        <>
          <MoonDomes
            passes={view.passes}
            looking={looking}
            bands={inView(layers.bands)}
            cursorMs={cursorMs}
            phase={moonPhase(view.table, cursorMs)}
            table={view.table}
          />
          <TwinTide
            {...view.shown}
            width={width}
            stations={view.passes.map(({ station, shown }) => ({
              callSign: station.callSign,
              points: shown,
            }))}
            bands={inView(layers.bands)}
            hidden={inView(layers.hidden)}
            taken={inView(taken)}
            cursorMs={cursorMs}
            slot={slot}
            onCursor={(atMs) =>
              onCursor(Math.min(Math.max(atMs, view.shown.startMs), view.shown.endMs))
            }
            onSlot={onSlot}
          />
        </>
      ) : null}
      <CursorTable
        table={view.table}
        stations={stations}
        cursorMs={cursorMs}
        frequencyMhz={bandById(question.band).centreMhz}
        quality={qualityAt(layers.curve, cursorMs)}
      />
      {props.children}
    </section>
  );
}
