import type { SkedState } from '../../domain/sked/types';
import { Icon } from './Icon';

interface Props {
  state: SkedState;
  /** Whether an offered sked waits for the viewer (else for others). */
  waitsForViewer?: boolean | undefined;
  /** Whether the viewer has left it to the others. */
  droppedOut?: boolean | undefined;
}

const WORDS: Record<Exclude<SkedState, 'offered'>, string> = {
  agreed: 'agreed',
  declined: 'declined',
  withdrawn: 'withdrawn',
  lapsed: 'lapsed',
  cancelled: 'cancelled',
  reported: 'reported',
};

/** State of a sked: a sign and always the word. */
export function StateLabel({ state, waitsForViewer = false, droppedOut = false }: Props) {
  if (droppedOut) {
    return (
      <span className="state state--quiet">
        <span className="state__sign state__sign--hatch" />
        you dropped out
      </span>
    );
  }
  if (state === 'offered') {
    return (
      <span className="state">
        <span
          className={`state__sign ${waitsForViewer ? 'state__sign--signal' : 'state__sign--ring'}`}
        />
        {waitsForViewer ? 'offered, waits for you' : 'offered, waits for them'}
      </span>
    );
  }
  const quiet = state !== 'agreed' && state !== 'reported';
  return (
    <span className={quiet ? 'state state--quiet' : 'state'}>
      {state === 'agreed' ? <span className="state__sign state__sign--accent" /> : null}
      {state === 'reported' ? <Icon name="check" /> : null}
      {state === 'declined' || state === 'withdrawn' || state === 'cancelled' ? (
        <span className="state__sign state__sign--hatch" />
      ) : null}
      {WORDS[state]}
    </span>
  );
}
