import { useMemo } from 'react';
import type { TimetableSlot, TimetableView } from '../../../domain/activity/timetableView';
import { bandById, type BandId } from '../../../domain/station/bands';
import { formatClock, formatDay, formatUtcRange } from '../../../domain/time/format';
import type { Interval } from '../../../domain/time/interval';
import { stretchesOf, widthOf, xOf } from './geometry';
import { HoursHead } from './HoursHead';
import { pairOf } from './model';
import { SlotChip } from './SlotChip';
import { endOf } from './SlotPanel';
import { RowGround, Stretches } from './StationRow';
import type { Hold } from './useHold';

interface Props {
  view: TimetableView;
  hold: Hold;
  chosen: string | null;
  onChoose: (wishId: string) => void;
}

interface Placed {
  slot: TimetableSlot;
  partner: number;
}

/** Stations as rows, UTC as columns. */
export function TimetableGrid({ view, hold, chosen, onChoose }: Props) {
  const span = useMemo<Interval>(
    () => ({ startMs: view.startMs, endMs: view.endMs }),
    [view.startMs, view.endMs],
  );
  const rows = useMemo(() => rowsOf(view), [view]);
  const tones = new Map(view.bands.map(({ band }, index) => [band as string, index]));
  const { held } = hold;
  const lifted = held ? pairOf(view.problem, held.slot.wishId) : null;
  const stretches = useMemo(
    () =>
      held ? stretchesOf(held.starts, view.problem.gridMinutes, view.problem.slotMinutes) : [],
    [held, view.problem],
  );
  const target =
    held && held.targetMs !== null
      ? { startMs: held.targetMs, endMs: endOf(view, held.targetMs) }
      : null;
  return (
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
          const concerned = lifted?.first === index || lifted?.second === index;
          return (
            <div key={station.id} className={concerned ? 'tt-row tt-row--concerned' : 'tt-row'}>
              <div className="tt-station">
                <span className="tt-station__place">{station.place}</span>
                <span>
                  <strong>{station.callSign}</strong>
                  <span className="label">{station.name}</span>
                </span>
              </div>
              <div className="tt-track" style={{ width: widthOf(span) }}>
                <RowGround station={station} span={span} />
                {concerned ? <Stretches stretches={stretches} span={span} /> : null}
                {rows[index]!.map(({ slot, partner }) => {
                  const isHeld = held?.slot.wishId === slot.wishId;
                  const startMs = isHeld && target ? target.startMs : slot.startMs;
                  const time = { startMs, endMs: endOf(view, startMs) };
                  return (
                    <SlotChip
                      key={slot.wishId}
                      slot={slot}
                      partner={view.stations[partner]!.place}
                      leftPx={xOf(span, startMs)}
                      widthPx={Math.max(14, xOf(span, time.endMs) - xOf(span, startMs) - 2)}
                      tone={tones.get(slot.band) ?? 0}
                      label={`${station.callSign} with ${view.stations[partner]!.callSign}, ${formatUtcRange(time)}, ${bandById(slot.band as BandId).label}${slot.pinned ? ', fixed' : ''}`}
                      chosen={chosen === slot.wishId}
                      lifted={isHeld}
                      onChoose={onChoose}
                      onLift={hold.lift}
                      onKey={hold.onKey}
                    />
                  );
                })}
                {held && concerned ? (
                  <span
                    className="tt-old"
                    style={{
                      left: xOf(span, held.slot.startMs),
                      width:
                        xOf(span, endOf(view, held.slot.startMs)) -
                        xOf(span, held.slot.startMs) -
                        2,
                    }}
                  />
                ) : null}
              </div>
            </div>
          );
        })}
      </div>
    </div>
  );
}

/** The slots of each station, with the index of the other one. */
function rowsOf(view: TimetableView): Placed[][] {
  const rows: Placed[][] = view.stations.map(() => []);
  for (const slot of [...view.slots].sort((a, b) => a.startMs - b.startMs)) {
    const { first, second } = pairOf(view.problem, slot.wishId);
    rows[first]!.push({ slot, partner: second });
    rows[second]!.push({ slot, partner: first });
  }
  return rows;
}
