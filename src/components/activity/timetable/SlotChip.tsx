import { memo, type KeyboardEvent, type PointerEvent } from 'react';
import type { TimetableSlot } from '../../../domain/activity/timetableView';

interface Props {
  slot: TimetableSlot;
  /** Roster number of the partner, and everything else in words. */
  partner: number;
  label: string;
  leftPx: number;
  widthPx: number;
  /** Place of its band among those of the activity. */
  tone: number;
  chosen: boolean;
  lifted: boolean;
  onChoose: (wishId: string) => void;
  onLift: (event: PointerEvent<HTMLButtonElement>, slot: TimetableSlot) => void;
  onKey: (event: KeyboardEvent<HTMLButtonElement>, slot: TimetableSlot) => void;
}

/** One slot in the row of one of its two stations. */
export const SlotChip = memo(function SlotChip(props: Props) {
  const { slot, partner, label, leftPx, widthPx, tone, chosen, lifted } = props;
  const classes = [
    'tt-slot',
    `tt-slot--tone${Math.min(tone, 3)}`,
    slot.pinned ? 'tt-slot--pinned' : '',
    chosen ? 'tt-slot--chosen' : '',
    lifted ? 'tt-slot--lifted' : '',
  ];
  return (
    <button
      type="button"
      className={classes.filter(Boolean).join(' ')}
      style={{ left: leftPx, width: widthPx }}
      aria-label={label}
      aria-pressed={chosen}
      data-wish={slot.wishId}
      onClick={() => props.onChoose(slot.wishId)}
      onPointerDown={(event) => props.onLift(event, slot)}
      onKeyDown={(event) => props.onKey(event, slot)}
    >
      {partner}
    </button>
  );
});
