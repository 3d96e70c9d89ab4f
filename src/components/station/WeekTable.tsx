import { weekdayName } from '../../domain/time/format';
import type { Weekday, WeeklyStretch } from '../../domain/time/weeklyHours';
import { Button } from '../ui/Button';
import { fieldId } from './useSave';

interface Props {
  weekly: WeeklyStretch[] | null;
  errorOf: (path: string) => string | undefined;
  onChange: (weekly: WeeklyStretch[]) => void;
}

const DAYS: Weekday[] = [1, 2, 3, 4, 5, 6, 7];

/** One row a weekday, any number of stretches in it. */
export function WeekTable({ weekly, errorOf, onChange }: Props) {
  const stretches = weekly ?? [];
  const set = (index: number, part: Partial<WeeklyStretch>) =>
    onChange(stretches.map((old, at) => (at === index ? { ...old, ...part } : old)));
  return (
    <div className="stack">
      {weekly === null ? (
        <p>
          <strong>All hours are usable.</strong> Choose other hours above or add a stretch to a day.
        </p>
      ) : null}
      <div className="border-t border-ink">
        {DAYS.map((weekday) => (
          <div
            key={weekday}
            role="group"
            aria-label={weekdayName(weekday)}
            className="grid grid-cols-[3rem_minmax(0,1fr)_auto] items-start gap-3 border-b border-rule py-2"
          >
            <span className="pt-2 font-semibold">{weekdayName(weekday)}</span>
            <div className="grid gap-2">
              {stretches.map((stretch, index) =>
                stretch.weekday === weekday ? (
                  <StretchFields
                    key={index}
                    stretch={stretch}
                    index={index}
                    errorOf={errorOf}
                    onSet={(part) => set(index, part)}
                    onRemove={() => onChange(stretches.filter((_, at) => at !== index))}
                  />
                ) : null,
              )}
              {weekly !== null && !stretches.some((stretch) => stretch.weekday === weekday) ? (
                <span className="quiet pt-2">not usable</span>
              ) : null}
            </div>
            <Button
              look="bare"
              icon="plus"
              aria-label={`Add a stretch on ${weekdayName(weekday)}`}
              onClick={() => onChange([...stretches, { weekday, from: '18:00', to: '22:00' }])}
            >
              <span className="max-sm:sr-only">Add</span>
            </Button>
          </div>
        ))}
      </div>
    </div>
  );
}

function StretchFields({
  stretch,
  index,
  errorOf,
  onSet,
  onRemove,
}: {
  stretch: WeeklyStretch;
  index: number;
  errorOf: Props['errorOf'];
  onSet: (part: Partial<WeeklyStretch>) => void;
  onRemove: () => void;
}) {
  const overnight = stretch.to <= stretch.from && stretch.to !== '';
  const day = weekdayName(stretch.weekday);
  const error = errorOf(`hours.weekly.${index}.from`) ?? errorOf(`hours.weekly.${index}.to`);
  const field = (end: 'from' | 'to') => ({
    id: fieldId(`hours.weekly.${index}.${end}`),
    className: 'field__control w-[4.75rem]! sm:w-[5.5rem]!',
    inputMode: 'numeric' as const,
    autoComplete: 'off',
    maxLength: 5,
    'aria-label': `${day}, ${end}`,
    'aria-invalid': errorOf(`hours.weekly.${index}.${end}`) ? (true as const) : undefined,
    'aria-describedby': error ? fieldId(`hours.weekly.${index}.problem`) : undefined,
    value: stretch[end],
  });
  return (
    <div>
      <div className="flex flex-wrap items-center gap-x-1 sm:gap-2">
        <input
          {...field('from')}
          onChange={(event) => onSet({ from: event.target.value })}
          onBlur={(event) => onSet({ from: clock(event.target.value) })}
        />
        <span aria-hidden="true">–</span>
        <input
          {...field('to')}
          onChange={(event) => onSet({ to: event.target.value })}
          onBlur={(event) => onSet({ to: clock(event.target.value) })}
        />
        <Button
          look="bare"
          icon="trash"
          aria-label={`Remove ${day} ${stretch.from} to ${stretch.to}`}
          onClick={onRemove}
        >
          <span className="sr-only">Remove</span>
        </Button>
        {overnight ? (
          <span className="quiet">to {weekdayName((stretch.weekday % 7) + 1)}</span>
        ) : null}
      </div>
      {error ? (
        <p className="field__error" id={fieldId(`hours.weekly.${index}.problem`)}>
          {error}
        </p>
      ) : null}
    </div>
  );
}

/** "8", "830" and "8:30" are written out; what is no time stays as it was typed. */
export function clock(text: string): string {
  const match = /^\s*(\d{1,2})(?:[:.h]?([0-5]\d))?\s*$/.exec(text);
  if (!match) return text;
  return `${match[1]!.padStart(2, '0')}:${match[2] ?? '00'}`;
}
