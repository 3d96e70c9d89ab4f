import { useState, type MouseEvent } from 'react';
import {
  moveFields,
  slotOfFields,
  type MoveChoice,
  type MoveFields,
} from '../../domain/sked/moveChoice';
import {
  formatClock,
  formatDay,
  formatDuration,
  formatLocalRange,
  formatUtcRange,
} from '../../domain/time/format';
import { QUALITY_NAMES, type QualityBasis } from '../../domain/window/quality';
import { Button, ButtonLink } from '../ui/Button';
import { TextAreaField, TextField } from '../ui/Field';
import { QualityChip } from '../ui/Quality';

interface Props {
  /** Address the form is posted to. */
  action: string;
  backTo: string;
  skedId: string;
  version: number;
  as: string;
  /** Of the link from a mail, where it is answered without an account. */
  secret?: string | undefined;
  parties: { callSign: string; timeZone: string }[];
  choices: (MoveChoice & { href: string })[];
  /** By what the choices are judged. */
  basis: QualityBasis;
  initial: MoveFields;
  words: string;
  errors: Partial<Record<keyof MoveFields | 'words', string>>;
  agreed: boolean;
}

/** Another time for a sked: fields in UTC with every local time beside them. A plain form until it is live. */
export function MoveForm(props: Props) {
  const [fields, setFields] = useState(props.initial);
  const slot = slotOfFields(fields);
  const inside = slot
    ? props.choices.find(
        ({ window }) => window.startMs <= slot.startMs && slot.endMs <= window.endMs,
      )
    : undefined;
  const set = (name: keyof MoveFields) => (event: { target: { value: string } }) =>
    setFields({ ...fields, [name]: event.target.value });
  const choose = (choice: MoveChoice) => (event: MouseEvent) => {
    event.preventDefault();
    setFields({
      ...moveFields(choice.slot),
      minutes: fields.minutes || moveFields(choice.slot).minutes,
    });
    document.getElementById('date')?.focus();
  };
  return (
    <div className="columns columns--even">
      <form className="form content-start" method="post" action={props.action} noValidate>
        <input type="hidden" name="id" value={props.skedId} />
        <input type="hidden" name="version" value={props.version} />
        <input type="hidden" name="as" value={props.as} />
        {props.secret ? <input type="hidden" name="secret" value={props.secret} /> : null}
        <div className="grid grid-cols-2 gap-x-4 gap-y-4 sm:grid-cols-3">
          <TextField
            id="date"
            name="date"
            type="date"
            label="Day, UTC"
            required
            value={fields.date}
            onChange={set('date')}
            error={props.errors.date}
          />
          <TextField
            id="time"
            name="time"
            inputMode="numeric"
            placeholder="22:00"
            autoComplete="off"
            label="Start, UTC"
            required
            value={fields.time}
            onChange={set('time')}
            error={props.errors.time}
          />
          <TextField
            id="minutes"
            name="minutes"
            inputMode="numeric"
            label="Minutes"
            required
            value={fields.minutes}
            onChange={set('minutes')}
            error={props.errors.minutes}
          />
        </div>
        <div aria-live="polite" className="min-h-24">
          {slot ? (
            <dl className="facts">
              <div>
                <dt>UTC</dt>
                <dd>
                  <strong>{formatUtcRange(slot)}</strong>
                </dd>
              </div>
              {props.parties.map(({ callSign, timeZone }) => (
                <div key={callSign}>
                  <dt>{callSign}</dt>
                  <dd>{formatLocalRange(slot, timeZone)}</dd>
                </div>
              ))}
            </dl>
          ) : (
            <p className="quiet">Give a day, a start and a length.</p>
          )}
          {slot ? (
            <p className="label mt-2">
              {inside
                ? `Inside the common window ${formatUtcRange(inside.window)}.`
                : 'Outside the common windows listed. The Moon’s place is checked when you send it.'}
            </p>
          ) : null}
        </div>
        <TextAreaField
          id="words"
          name="words"
          label="Words for the others"
          note="May stay empty."
          maxLength={500}
          defaultValue={props.words}
          error={props.errors.words}
        />
        <div className="row">
          <Button type="submit" look="filled" large>
            {slot
              ? `Offer ${formatClock(slot.startMs)}–${formatClock(slot.endMs)}`
              : 'Offer this time'}
          </Button>
          <ButtonLink href={props.backTo} large>
            {props.agreed ? 'Keep the agreed time' : 'Leave it as it is'}
          </ButtonLink>
        </div>
      </form>
      <section aria-labelledby="windows-heading">
        <h2 id="windows-heading">Common windows in the next two weeks</h2>
        <p className="label">
          Everybody awake, nobody taken, room for the whole slot. {QUALITY_NAMES[props.basis]} in dB
          at the best moment.
        </p>
        {props.choices.length > 0 ? (
          <ul className="mt-2 border-t border-ink">
            {props.choices.map((choice) => (
              <li
                key={choice.window.startMs}
                className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1 border-b border-rule py-2"
              >
                <span>
                  <strong>{formatDay(choice.window.startMs)}</strong>{' '}
                  {formatUtcRange(choice.window).replace(
                    `${formatDay(choice.window.startMs)} `,
                    '',
                  )}
                  <span className="quiet">
                    {' '}
                    {formatDuration(choice.window.endMs - choice.window.startMs)}
                  </span>
                </span>
                <span className="flex items-center gap-3">
                  <QualityChip quality={choice.quality} />
                  <a
                    className="button button--framed"
                    href={choice.href}
                    onClick={choose(choice)}
                    aria-label={`Take ${formatUtcRange(choice.slot)}`}
                  >
                    Take {formatClock(choice.slot.startMs)}
                  </a>
                </span>
              </li>
            ))}
          </ul>
        ) : (
          <p className="mt-2">
            None. A shorter slot or an hour outside the usable ones may still do.
          </p>
        )}
      </section>
    </div>
  );
}
