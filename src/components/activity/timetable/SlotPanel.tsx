import { useMemo, useState } from 'react';
import { obstacleWords, placesOf, wishById } from '../../../domain/activity/timetable';
import type { TimetableView } from '../../../domain/activity/timetableView';
import { bandById, type BandId } from '../../../domain/station/bands';
import { formatClock, formatLocal, formatSigned, formatUtc } from '../../../domain/time/format';
import { MINUTE_MS } from '../../../domain/time/interval';
import { Button } from '../../ui/Button';
import { elevationAt } from './elevation';
import type { Change } from './model';
import { freePlaces, pairName, pairOf, slotOfWish } from './model';

interface Props {
  view: TimetableView;
  wishId: string;
  /** Start at which the slot is held over the table; null: it is not held. */
  heldMs: number | null;
  nowMs: number;
  change: (change: Change) => void;
}

/** The chosen contact: its figures, where else it may stand, and what can be done with it. */
export function SlotPanel({ view, wishId, heldMs, nowMs, change }: Props) {
  const slot = slotOfWish(view, wishId);
  const free = useMemo(() => freePlaces(view, wishId, nowMs), [view, wishId, nowMs]);
  const [wanted, setWanted] = useState('');
  const options = useMemo(
    () =>
      free.map(({ band, startMs, chance: of }) => (
        <option key={valueOf(band, startMs)} value={valueOf(band, startMs)}>
          {`${formatUtc(startMs)}, ${labelOf(band)}, ${Math.round(100 * of)} in 100`}
        </option>
      )),
    [free],
  );
  const { problem } = view;
  const { first, second } = pairOf(problem, wishId);
  const stations = [view.stations[first]!, view.stations[second]!];
  const shownMs = heldMs ?? slot?.startMs ?? null;
  const place = free.find(({ band, startMs }) => valueOf(band, startMs) === wanted);
  const chance =
    shownMs === null
      ? null
      : (wishById(problem, wishId)?.options.find(
          ({ band, startMs }) => startMs === shownMs && band === (slot?.band ?? band),
        )?.chance ?? null);
  return (
    <section className="tt-panel" aria-labelledby="tt-panel-heading">
      <h2 id="tt-panel-heading">{heldMs === null ? 'The slot' : 'Moving one slot'}</h2>
      <p className="tt-panel__pair">
        <strong>{pairName(view, wishId)}</strong>
        {slot ? `, ${labelOf(slot.band)}` : ''}
      </p>
      <dl className="tt-facts">
        {slot ? (
          <>
            <dt>{heldMs === null ? 'Time' : 'From'}</dt>
            <dd>{formatUtc(slot.startMs)}</dd>
          </>
        ) : null}
        {heldMs !== null ? (
          <>
            <dt>To</dt>
            <dd>
              <strong>{formatUtc(heldMs)}</strong>
            </dd>
          </>
        ) : null}
        {shownMs !== null
          ? stations.map((station) => (
              <Pair
                key={station.id}
                term={`At ${station.callSign}`}
                value={`${formatLocal(shownMs, station.timeZone)}, Moon ${Math.round(elevationAt(view, station, shownMs))}°`}
              />
            ))
          : null}
        {chance !== null ? (
          <Pair term="Chance" value={`${Math.round(100 * chance)} in 100`} />
        ) : null}
        {heldMs === null && slot && slot.marginDb !== null ? (
          <Pair term="Margin, weaker side" value={`${formatSigned(slot.marginDb)} dB`} />
        ) : null}
        <Pair term="Starts possible" value={String(free.length)} />
        {view.published ? <Pair term="Told when published" value="both stations" /> : null}
      </dl>
      {slot?.begun ? (
        <p className="quiet">It has begun, so it stays as it is.</p>
      ) : (
        <div className="tt-panel__do">
          {free.length > 0 ? (
            <div className="field">
              <label className="field__label" htmlFor="tt-start">
                {slot ? 'Move it to' : 'Put it at'}
              </label>
              <select
                id="tt-start"
                className="field__control"
                value={place ? wanted : ''}
                onChange={(event) => setWanted(event.target.value)}
              >
                <option value="">Choose a start</option>
                {options}
              </select>
            </div>
          ) : (
            <Blocked view={view} wishId={wishId} />
          )}
          <div className="row">
            {place ? (
              <Button
                look="filled"
                onClick={() => {
                  change({ kind: 'place', wishId, band: place.band, startMs: place.startMs });
                  setWanted('');
                }}
              >
                {slot ? 'Move it' : 'Put it in'} {formatClock(place.startMs)}
              </Button>
            ) : null}
            {slot ? (
              <>
                <Button onClick={() => change({ kind: 'pin', wishId, pinned: !slot.pinned })}>
                  {slot.pinned ? 'Let it move' : 'Fix it'}
                </Button>
                <Button look="harmful" onClick={() => change({ kind: 'remove', wishId })}>
                  Take it out
                </Button>
              </>
            ) : null}
          </div>
        </div>
      )}
      <p className="label">
        {heldMs === null
          ? 'Drag a slot, or press Enter on it and move it with the arrows.'
          : `Drop with Enter, put back with Esc, arrows go to the next start, ${problem.gridMinutes} min at least.`}
      </p>
    </section>
  );
}

function Pair({ term, value }: { term: string; value: string }) {
  return (
    <>
      <dt>{term}</dt>
      <dd>{value}</dd>
    </>
  );
}

/** Why none of the starts that the sky allows is free: the reasons of the best of them. */
function Blocked({ view, wishId }: { view: TimetableView; wishId: string }) {
  const [best] = placesOf(view.problem, view.slots, wishId).sort(
    (a, b) => a.obstacles.length - b.obstacles.length || b.chance - a.chance,
  );
  if (!best) return <p>The sky leaves these two no start.</p>;
  return (
    <div>
      <p>Every start is taken. In the way of {formatUtc(best.startMs)}:</p>
      <ul>
        {best.obstacles.map((obstacle) => {
          const words = obstacleWords(view.problem, obstacle);
          return <li key={words}>{words}</li>;
        })}
      </ul>
    </div>
  );
}

function valueOf(band: string, startMs: number): string {
  return `${band} ${startMs}`;
}

function labelOf(band: string): string {
  return bandById(band as BandId).label;
}

/** Where the slot ends, for labels. */
export function endOf(view: TimetableView, startMs: number): number {
  return startMs + view.problem.slotMinutes * MINUTE_MS;
}
