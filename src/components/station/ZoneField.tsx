import { useEffect, useId, useState } from 'react';
import { formatClock, isTimeZone, zoneName } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { TextField } from '../ui/Field';
import { fieldId } from './useSave';

/** A time zone by name, searched while typing; offers the browser's own. */
export function ZoneField({
  value,
  zones,
  nowMs,
  onChange,
  error,
}: {
  value: string;
  zones: string[];
  nowMs: number;
  onChange: (zone: string) => void;
  error: string | undefined;
}) {
  const listId = useId();
  const [browserZone, setBrowserZone] = useState<string | null>(null);
  useEffect(() => {
    setBrowserZone(new Intl.DateTimeFormat().resolvedOptions().timeZone);
  }, []);
  const known = isTimeZone(value);
  return (
    <div>
      <TextField
        id={fieldId('timeZone')}
        label="Time zone (type to search)"
        list={listId}
        autoComplete="off"
        spellCheck={false}
        value={value}
        onChange={(event) => onChange(event.target.value)}
        note={
          known ? `It is ${formatClock(nowMs, value)} ${zoneName(nowMs, value)} there.` : undefined
        }
        error={error}
      />
      <datalist id={listId}>
        {zones.map((zone) => (
          <option key={zone} value={zone} />
        ))}
      </datalist>
      {browserZone && browserZone !== value ? (
        <Button look="bare" onClick={() => onChange(browserZone)}>
          Use {browserZone}, as this browser does
        </Button>
      ) : null}
    </div>
  );
}
