import { useMemo } from 'react';
import type { TimetableView } from '../../../domain/activity/timetableView';
import { formatClock, formatDay } from '../../../domain/time/format';
import { MINUTE_MS } from '../../../domain/time/interval';
import { spanOf, stretchesOf } from './geometry';
import { HoursHead } from './HoursHead';
import { pairOf } from './model';
import { rowsOf } from './rows';
import { StationRow, type HeldHere } from './StationRow';
import type { Hold } from './useHold';

interface Props {
  view: TimetableView;
  hold: Hold;
  chosen: string | null;
  onChoose: (wishId: string) => void;
}

/** Stations as rows, UTC as columns. */
export function TimetableGrid({ view, hold, chosen, onChoose }: Props) {
  const { problem } = view;
  const { startMs, endMs } = view;
  const span = useMemo(() => spanOf({ startMs, endMs }, problem), [startMs, endMs, problem]);
  const rows = useMemo(() => rowsOf(view), [view]);
  const { held } = hold;
  const concerned = held ? pairOf(problem, held.slot.wishId) : null;
  const starts = held?.starts;
  const stretches = useMemo(
    () => (starts ? stretchesOf(starts, problem.gridMinutes, problem.slotMinutes) : []),
    [starts, problem],
  );
  const slotMs = problem.slotMinutes * MINUTE_MS;
  const from = held?.slot.startMs;
  const targetMs = held?.targetMs ?? null;
  const wishId = held?.slot.wishId;
  const here = useMemo<HeldHere | null>(
    () =>
      wishId === undefined || from === undefined
        ? null
        : {
            wishId,
            from: { startMs: from, endMs: from + slotMs },
            target: targetMs === null ? null : { startMs: targetMs, endMs: targetMs + slotMs },
            stretches,
          },
    [wishId, from, targetMs, slotMs, stretches],
  );
  const target = here?.target ?? null;
  return (
    // What scrolls must be reached with the keyboard.
    // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex
    <div className="tt-scroll" tabIndex={0} role="group" aria-label="Timetable, scrolls sideways">
      <svg width="0" height="0" className="tt-defs" aria-hidden="true">
        <defs>
          <pattern
            id="tt-asleep"
            width="7"
            height="7"
            patternUnits="userSpaceOnUse"
            patternTransform="rotate(45)"
          >
            <path className="tt-asleep" d="M0 0V7" />
          </pattern>
        </defs>
      </svg>
      <div className="tt-grid">
        <div className="tt-corner label">UTC</div>
        <HoursHead
          span={span}
          flag={
            target && {
              ...target,
              text: `${formatDay(target.startMs).slice(0, 3)} ${formatClock(target.startMs)}–${formatClock(target.endMs)}`,
            }
          }
        />
        {view.stations.map((station, index) => {
          const chips = rows[index]!;
          const holds = concerned?.first === index || concerned?.second === index;
          return (
            <StationRow
              key={station.id}
              station={station}
              span={span}
              chips={chips}
              chosen={chips.some(({ slot }) => slot.wishId === chosen) ? chosen : null}
              held={holds ? here : null}
              onChoose={onChoose}
              lift={hold.lift}
              onKey={hold.onKey}
            />
          );
        })}
      </div>
    </div>
  );
}
