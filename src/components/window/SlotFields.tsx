import { useState } from 'react';
import { formatClock } from '../../domain/time/format';
import { DAY_MS, MINUTE_MS, type Interval } from '../../domain/time/interval';
import { minuteOfDay } from '../../domain/time/weeklyHours';
import { TextField } from '../ui/Field';

interface Props {
  slot: Interval;
  onSlot: (slot: Interval) => void;
}

const LONGEST_MINUTES = 1440;
const SHORTEST_MINUTES = 10;

/** The instant nearest to `nearMs` at which the UTC clock shows the typed time ("22:00", "2200"); null when it is none. */
export function nearestAtClock(text: string, nearMs: number): number | null {
  const match = /^(\d{1,2})[:.]?(\d{2})$/.exec(text.trim());
  if (!match || Number(match[1]) > 23 || Number(match[2]) > 59) return null;
  const minute = minuteOfDay(`${match[1]!.padStart(2, '0')}:${match[2]}`);
  const sameDay = Math.floor(nearMs / DAY_MS) * DAY_MS + minute * MINUTE_MS;
  const days = Math.round((nearMs - sameDay) / DAY_MS);
  return sameDay + days * DAY_MS;
}

/** Start in UTC and length in minutes, as numbers beside the handles of the picture. */
export function SlotFields({ slot, onSlot }: Props) {
  const minutes = Math.round((slot.endMs - slot.startMs) / MINUTE_MS);
  const [start, setStart] = useState<string | null>(null);
  const [length, setLength] = useState<string | null>(null);
  const wrongStart = start !== null && nearestAtClock(start, slot.startMs) === null;
  const wrongLength =
    length !== null && !(Number(length) >= SHORTEST_MINUTES && Number(length) <= LONGEST_MINUTES);
  return (
    <div className="offer__fields">
      <TextField
        id="slot-start"
        label="Slot starts, UTC"
        inputMode="numeric"
        autoComplete="off"
        value={start ?? formatClock(slot.startMs)}
        error={wrongStart ? 'Write the time as 22:00.' : undefined}
        onChange={(event) => {
          setStart(event.target.value);
          const startMs = nearestAtClock(event.target.value, slot.startMs);
          if (startMs !== null) onSlot({ startMs, endMs: startMs + minutes * MINUTE_MS });
        }}
        onBlur={() => setStart(null)}
      />
      <TextField
        id="slot-minutes"
        label="Length, min"
        inputMode="numeric"
        autoComplete="off"
        value={length ?? String(minutes)}
        error={wrongLength ? 'Between 10 minutes and 24 hours.' : undefined}
        onChange={(event) => {
          setLength(event.target.value);
          const wished = Math.round(Number(event.target.value));
          if (wished >= SHORTEST_MINUTES && wished <= LONGEST_MINUTES) {
            onSlot({ startMs: slot.startMs, endMs: slot.startMs + wished * MINUTE_MS });
          }
        }}
        onBlur={() => setLength(null)}
      />
    </div>
  );
}
