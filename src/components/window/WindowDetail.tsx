import { useMemo, useState, type ReactNode } from 'react';
import { describe } from '../../domain/link/budget';
import type { LinkMoment } from '../../domain/link/moment';
import { bandById } from '../../domain/station/bands';
import { formatClock, formatDay } from '../../domain/time/format';
import { overlaps, type Interval } from '../../domain/time/interval';
import { moonPhase } from '../../domain/window/moonPhase';
import { judgedAt } from '../../domain/window/judge';
import { linkSheets } from '../../domain/window/ledgerSheet';
import { linkMatrix, pairsOf } from '../../domain/window/linkMatrix';
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
  const moments = useMemo(
    () => judge.links.map((link) => link.over(view.table)),
    [judge, view.table],
  );
  const moment = moments.length === 1 ? moments[0]! : null;
  for (const one of moments) one.compute(cursorMs);
  const allUp = moments.every(({ moonUp }) => moonUp);
  const [linkOf, setLinkOf] = useState<{ first: number; second: number } | null>(null);
  const links = useMemo(
    () => (linkOf ? linksAt(answer, moments, cursorMs, linkOf) : null),
    [answer, moments, cursorMs, linkOf],
  );
  const openLink = () => {
    const weakest = moments.reduce(
      (least, one, at) => (one.marginDb < moments[least]!.marginDb ? at : least),
      0,
    );
    setLinkOf(pairsOf(stations.length)[weakest]!);
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
      {moments.length > 0 ? (
        <div>
          <Button look="bare" icon="arrowLeftRight" onClick={openLink}>
            {moment ? 'Link in both directions' : 'Links of every pair'} at {formatClock(cursorMs)}
          </Button>
          <LinkDialog
            sheets={links?.sheets ?? null}
            round={
              links?.matrix && linkOf
                ? {
                    matrix: links.matrix,
                    pair: linkOf,
                    onPair: (from, to) =>
                      setLinkOf({ first: Math.min(from, to), second: Math.max(from, to) }),
                  }
                : null
            }
            onClose={() => setLinkOf(null)}
          />
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

/** The ledgers of one pair at the cursor, and of a round the margins of all. */
function linksAt(
  { question, stations }: Answer,
  moments: readonly LinkMoment[],
  timeMs: number,
  pair: { first: number; second: number },
) {
  const pairs = pairsOf(stations.length).map(({ first, second }, at) => {
    moments[at]!.compute(timeMs);
    return { first, second, link: describe(moments[at]!) };
  });
  const { first, second } = pair;
  const chosen = pairs.find((one) => one.first === first && one.second === second);
  const setups = [first, second].map((at) => setupOn(stations[at]!, question.band));
  if (!chosen || !setups[0] || !setups[1] || question.mode === null) return null;
  const { label } = bandById(question.band);
  return {
    sheets: linkSheets(chosen.link, [setups[0], setups[1]], question.mode, label, timeMs),
    matrix:
      stations.length > 2
        ? linkMatrix(
            stations.map(({ callSign }) => callSign),
            pairs,
            timeMs,
          )
        : null,
  };
}
