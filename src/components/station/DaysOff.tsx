import { useState } from 'react';
import { formatDay } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { TextField } from '../ui/Field';

interface Props {
  daysOff: string[];
  onChange: (daysOff: string[]) => void;
}

/** Days on which nobody is there, from local midnight to local midnight. */
export function DaysOff({ daysOff, onChange }: Props) {
  const [date, setDate] = useState('');
  const add = () => {
    if (!/^\d{4}-\d{2}-\d{2}$/.test(date)) return;
    onChange([...new Set([...daysOff, date])].sort());
    setDate('');
  };
  return (
    <fieldset className="group ruled stack">
      <legend className="sr-only">Days off</legend>
      <h2>Days off</h2>
      <p className="quiet">
        Nobody is there all day by the local calendar, whatever the week says.
      </p>
      <div className="row items-end">
        <TextField
          id="day-off"
          label="Date"
          type="date"
          value={date}
          onChange={(event) => setDate(event.target.value)}
        />
        <Button icon="plus" onClick={add} disabled={date === ''}>
          Add the day
        </Button>
      </div>
      <ul className="m-0 list-none p-0">
        {daysOff.map((day) => (
          <li key={day} className="row justify-between border-b border-rule py-1">
            {formatDay(Date.parse(`${day}T12:00:00Z`), { withYear: true })}
            <Button
              look="bare"
              icon="trash"
              aria-label={`Remove ${day}`}
              onClick={() => onChange(daysOff.filter((other) => other !== day))}
            >
              <span className="max-sm:sr-only">Remove</span>
            </Button>
          </li>
        ))}
      </ul>
    </fieldset>
  );
}
