import { memo } from 'react';
import type { TimetableStation } from '../../../domain/activity/timetableView';
import { subtractIntervals, type Interval } from '../../../domain/time/interval';
import { hillPath, hourLines, ROW_PX, widthOf, xOf, type Span } from './geometry';
import type { Chip } from './rows';
import { SlotChip } from './SlotChip';
import type { Hold } from './useHold';

interface Props extends Pick<Hold, 'lift' | 'onKey'> {
  station: TimetableStation;
  span: Span;
  chips: readonly Chip[];
  /** The chosen wish, where it has a slot in this row. */
  chosen: string | null;
  /** The slot that is held, where it belongs to this row. */
  held: HeldHere | null;
  onChoose: (wishId: string) => void;
}

export interface HeldHere {
  wishId: string;
  from: Interval;
  /** Null: over no free start. */
  target: Interval | null;
  /** Where it may be put down. */
  stretches: readonly Interval[];
}

/** One station: its name, the ground, and its slots. Drawn anew only when something of it changes. */
export const StationRow = memo(function StationRow(props: Props) {
  const { station, span, chips, chosen, held } = props;
  return (
    <div className={held ? 'tt-row tt-row--concerned' : 'tt-row'}>
      <div className="tt-station">
        <span className="tt-station__place">{station.place}</span>
        <span>
          <strong>{station.callSign}</strong>
          <span className="label">{station.name}</span>
        </span>
      </div>
      <div className="tt-track" style={{ width: widthOf(span) }}>
        <RowGround station={station} span={span} />
        {held ? <Stretches stretches={held.stretches} span={span} /> : null}
        {chips.map((chip) => {
          const lifted = held?.wishId === chip.slot.wishId;
          return (
            <SlotChip
              key={chip.slot.wishId}
              {...chip}
              leftPx={lifted && held.target ? xOf(span, held.target.startMs) : chip.leftPx}
              chosen={chosen === chip.slot.wishId}
              lifted={lifted}
              onChoose={props.onChoose}
              onLift={props.lift}
              onKey={props.onKey}
            />
          );
        })}
        {held ? (
          <span
            className="tt-old"
            style={{
              left: xOf(span, held.from.startMs),
              width: xOf(span, held.from.endMs) - xOf(span, held.from.startMs) - 2,
            }}
          />
        ) : null}
      </div>
    </div>
  );
});

/** The ground of a station's row: hours, sleep, and the Moon's height. */
const RowGround = memo(function RowGround({
  station,
  span,
}: {
  station: TimetableStation;
  span: Span;
}) {
  const asleep = subtractIntervals([span], station.usable);
  return (
    <svg className="tt-ground" width={widthOf(span)} height={ROW_PX} aria-hidden="true">
      {asleep.map((stretch) => (
        <rect
          key={stretch.startMs}
          x={xOf(span, stretch.startMs)}
          width={xOf(span, stretch.endMs) - xOf(span, stretch.startMs)}
          height={ROW_PX}
          fill="url(#tt-asleep)"
        />
      ))}
      <path className="tt-hill" d={hillPath(span, station.moonElevationDeg)} />
      {hourLines(span).map(({ x, line }) => (
        <path key={x} className={`tt-line tt-line--${line}`} d={`M${x} 0V${ROW_PX}`} />
      ))}
    </svg>
  );
});

/** Where the slot that is held may be put down, framed. */
const Stretches = memo(function Stretches({
  stretches,
  span,
}: {
  stretches: readonly Interval[];
  span: Span;
}) {
  return (
    <>
      {stretches.map((stretch) => (
        <span
          key={stretch.startMs}
          className="tt-stretch"
          style={{
            left: xOf(span, stretch.startMs),
            width: xOf(span, stretch.endMs) - xOf(span, stretch.startMs),
          }}
        />
      ))}
    </>
  );
});
