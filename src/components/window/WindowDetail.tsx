import { useMemo, useState, type ReactNode } from 'react';
import { describe } from '../../domain/link/budget';
import { bandById } from '../../domain/station/bands';
import { formatClock, formatDay } from '../../domain/time/format';
import { overlaps, type Interval } from '../../domain/time/interval';
import { moonPhase } from '../../domain/window/moonPhase';
import { judgedAt } from '../../domain/window/judge';
import { linkSheets, type LinkSheets } from '../../domain/window/ledgerSheet';
import { qualityFigure } from '../../domain/window/quality';
import { setupOn } from '../../domain/window/searchData';
import { windowSentence } from '../../domain/window/sentences';
import { MoonDomes } from '../chart/MoonDomes';
import { TwinTide } from '../chart/TwinTide';
import type { Answer } from './answer';
import { Button } from '../ui/Button';
import { CursorTable } from './CursorTable';
import { CurvesThrough } from './CurvesThrough';
import { detailView } from './detailView';
import { LinkDialog } from './LinkDialog';
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
  const { judge } = layers;
  const [sheets, setSheets] = useState<LinkSheets | null>(null);
  const moment = useMemo(
    () => (judge.links.length === 1 ? judge.links[0]!.over(view.table) : null),
    [judge, view.table],
  );
  moment?.compute(cursorMs);
  const allUp = judge.links.every((link) => link.over(view.table).look(cursorMs));
  const openLink = () => {
    const [first, second] = stations.map((station) => setupOn(station, question.band));
    if (!moment || !first || !second || question.mode === null) return;
    moment.compute(cursorMs);
    const { label } = bandById(question.band);
    setSheets(linkSheets(describe(moment), [first, second], question.mode, label, cursorMs));
  };
  const moveCursor = (atMs: number) =>
    onCursor(Math.min(Math.max(atMs, view.shown.startMs), view.shown.endMs));
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
          <strong>{qualityFigure(quality)}</strong> dB, {quality.step}
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
            onCursor={moveCursor}
            onSlot={onSlot}
          />
        </>
      ) : null}
      <CursorTable
        table={view.table}
        stations={stations}
        cursorMs={cursorMs}
        frequencyMhz={bandById(question.band).centreMhz}
        quality={allUp ? judgedAt(judge, cursorMs, view.table) : null}
        link={moment}
      />
      {moment ? (
        <div>
          <Button look="bare" icon="arrowLeftRight" onClick={openLink}>
            Link in both directions at {formatClock(cursorMs)}
          </Button>
          <LinkDialog sheets={sheets} onClose={() => setSheets(null)} />
        </div>
      ) : null}
      {width > 0 ? (
        <CurvesThrough
          answer={answer}
          view={view}
          window={window}
          width={width}
          cursorMs={cursorMs}
          onCursor={moveCursor}
        />
      ) : null}
      {props.children}
    </section>
  );
}
