import { useEffect, useState } from 'react';
import { Icon } from '../ui/Icon';

const STEPS = ['Call signs', 'Report', 'Acknowledged'] as const;

interface Props {
  /** Where the ticks are kept in this tab. */
  storageKey: string;
  partner: string;
  /** What is expected of the link, in words. */
  margin: string | null;
}

/** What a contact consists of, to be ticked while it happens; kept until the tab is closed. */
export function ContactSteps({ storageKey, partner, margin }: Props) {
  const [ticked, setTicked] = useState<string[]>([]);
  useEffect(() => setTicked(read(storageKey)), [storageKey]);
  const toggle = (step: string) => {
    const next = ticked.includes(step) ? ticked.filter((one) => one !== step) : [...ticked, step];
    setTicked(next);
    write(storageKey, next);
  };
  const complete = STEPS.every((step) => ticked.includes(step));
  return (
    <section aria-label={`The contact with ${partner}`}>
      <div className="live__contacthead">
        <h2>The contact</h2>
        {margin ? <p className="live__quiet">{margin}</p> : null}
      </div>
      <div className="live__steps">
        {STEPS.map((step) => (
          <button
            key={step}
            type="button"
            aria-pressed={ticked.includes(step)}
            onClick={() => toggle(step)}
          >
            {ticked.includes(step) ? <Icon name="check" /> : null}
            {step}
          </button>
        ))}
      </div>
      <p className="live__quiet" role="status">
        {complete ? 'Complete. 73, and report it when the slot is over.' : ''}
      </p>
    </section>
  );
}

function read(key: string): string[] {
  try {
    const kept: unknown = JSON.parse(sessionStorage.getItem(key) ?? '[]');
    return Array.isArray(kept) ? kept.filter((step) => typeof step === 'string') : [];
  } catch {
    return [];
  }
}

/** Where storing is forbidden the ticks last as long as the page. */
function write(key: string, steps: string[]): void {
  try {
    sessionStorage.setItem(key, JSON.stringify(steps));
  } catch {
    return;
  }
}
