import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { canBeMoved } from '../../domain/sked/calendarView';
import { moveFields, slotOfFields, type MoveFields } from '../../domain/sked/moveChoice';
import { partnersOf, type SkedSummary } from '../../domain/sked/view';
import { bandById } from '../../domain/station/bands';
import { modeById } from '../../domain/station/modes';
import { formatClock, formatLocalRange, formatUtcRange } from '../../domain/time/format';
import type { Interval } from '../../domain/time/interval';
import { paths } from '../../paths';
import { Button, ButtonLink } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { TextAreaField, TextField } from '../ui/Field';
import { StateLabel } from '../ui/StateLabel';
import { moveSked, Refused } from './calendarApi';

interface Props {
  sked: SkedSummary;
  /** Where it was dragged to; absent when it was only opened. */
  wished?: Interval | undefined;
  nowMs: number;
  onClose: () => void;
  onMoved: (sentence: string) => void;
}

/** One sked of the calendar: what it is, and another time for it, dragged or typed. */
export function SkedDialog({ sked, wished, nowMs, onClose, onMoved }: Props) {
  const partners = partnersOf(sked.parties);
  return (
    <Dialog
      open
      title={wished ? `Move the sked with ${partners}?` : `Sked with ${partners}`}
      onClose={onClose}
    >
      <p className="flex flex-wrap gap-x-5">
        <StateLabel state={sked.state} waitsForViewer={sked.waitsForViewer} />
        <span className="quiet">
          {bandById(sked.band).label}, {modeById(sked.mode).label}
        </span>
      </p>
      <p>
        {wished ? 'Now: ' : ''}
        <strong>{formatUtcRange(sked)}</strong>
      </p>
      {wished ? null : (
        <p>
          <ButtonLink href={paths.sked(sked.id)} look={sked.waitsForViewer ? 'filled' : 'framed'}>
            {sked.waitsForViewer ? 'Answer it on its page' : 'Open its page'}
          </ButtonLink>
        </p>
      )}
      {canBeMoved(sked, nowMs) ? (
        <MoveFieldsForm
          sked={sked}
          wished={wished}
          partners={partners}
          onClose={onClose}
          onMoved={onMoved}
        />
      ) : (
        <div className="row">
          <Button onClick={onClose}>Close</Button>
        </div>
      )}
    </Dialog>
  );
}

function MoveFieldsForm({
  sked,
  wished,
  partners,
  onClose,
  onMoved,
}: Omit<Props, 'nowMs'> & { partners: string }) {
  const [fields, setFields] = useState<MoveFields>(moveFields(wished ?? sked));
  const [words, setWords] = useState('');
  const slot = slotOfFields(fields);
  const move = useMutation({
    mutationFn: (to: Interval) => moveSked(sked, to, words),
    onSuccess: (_outcome, to) => {
      onMoved(`Offered to ${partners}: ${formatUtcRange(to)}. They answer again.`);
    },
  });
  const set = (name: keyof MoveFields) => (event: { target: { value: string } }) =>
    setFields({ ...fields, [name]: event.target.value });
  const refused = move.error instanceof Refused ? move.error : null;
  const unchanged = slot?.startMs === sked.startMs && slot.endMs === sked.endMs;
  return (
    <form
      className="stack"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        if (slot && !unchanged) move.mutate(slot);
      }}
    >
      <fieldset className="group">
        <legend className={wished ? 'sr-only' : ''}>Move it</legend>
        <div className="grid grid-cols-3 gap-3">
          <TextField
            id="move-date"
            type="date"
            label="Day, UTC"
            value={fields.date}
            onChange={set('date')}
          />
          <TextField
            id="move-time"
            inputMode="numeric"
            autoComplete="off"
            label="Start, UTC"
            value={fields.time}
            onChange={set('time')}
          />
          <TextField
            id="move-minutes"
            inputMode="numeric"
            label="Minutes"
            value={fields.minutes}
            onChange={set('minutes')}
          />
        </div>
      </fieldset>
      <ul className="label" aria-live="polite">
        {slot ? (
          sked.parties.map(({ callSign, timeZone }) => (
            <li key={callSign}>
              {callSign} {formatLocalRange(slot, timeZone)}
            </li>
          ))
        ) : (
          <li>Give a day, a start such as 22:00 and a length in minutes.</li>
        )}
      </ul>
      {sked.state === 'agreed' ? (
        <p>
          The agreed {formatUtcRange(sked)} is given up at once; the sked is agreed again when{' '}
          {partners} has accepted the new time.
        </p>
      ) : null}
      {refused ? (
        <div className="notice notice--problem stack" role="alert">
          <p>{refused.message}</p>
          {refused.alternatives.length > 0 ? (
            <>
              <p>Free for everyone:</p>
              <div className="row">
                {refused.alternatives.map((free) => (
                  <Button key={free.startMs} onClick={() => setFields(moveFields(free))}>
                    {formatUtcRange(free)}
                  </Button>
                ))}
              </div>
            </>
          ) : null}
        </div>
      ) : null}
      <TextAreaField
        id="move-words"
        label={`Words for ${partners}`}
        rows={2}
        maxLength={500}
        value={words}
        onChange={(event) => setWords(event.target.value)}
      />
      <div className="row">
        <Button
          type="submit"
          look={sked.waitsForViewer && !wished ? 'framed' : 'filled'}
          disabled={!slot || unchanged || move.isPending}
        >
          {slot && !unchanged
            ? `Move it to ${formatClock(slot.startMs)}–${formatClock(slot.endMs)}`
            : 'Move it'}
        </Button>
        <Button onClick={onClose}>Keep it</Button>
      </div>
    </form>
  );
}
