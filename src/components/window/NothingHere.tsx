import { DAY_MS } from '../../domain/time/interval';
import type { WindowLayers } from '../../domain/window/layers';
import type { WindowQuestion } from '../../domain/window/question';
import { nothingFound, type NextStep } from '../../domain/window/sentences';
import { Button } from '../ui/Button';
import { EmptyState } from '../ui/Notices';

interface Props {
  layers: WindowLayers;
  question: WindowQuestion;
  onChange: (question: WindowQuestion) => void;
}

/** What each next step is called, and the question it leads to. */
const STEPS: Record<NextStep, { label: string; ask: (from: WindowQuestion) => WindowQuestion }> = {
  countAny: {
    label: 'Count hours outside our usable hours too',
    ask: (from) => ({ ...from, counting: 'any' }),
  },
  shorter: {
    label: 'Take stretches from 10 minutes on',
    ask: (from) => ({ ...from, minimumMinutes: 10 }),
  },
  dropDegradation: {
    label: 'Drop the limit of degradation',
    ask: (from) => ({ ...from, maximumDegradationDb: null }),
  },
  dropMargin: {
    label: 'Drop the least margin',
    ask: (from) => ({ ...from, minimumMarginDb: null }),
  },
  dropSun: {
    label: 'Drop the distance from the Sun',
    ask: (from) => ({ ...from, minimumSunSeparationDeg: null }),
  },
  lower: {
    label: 'Go back to the stations’ own lowest elevations',
    ask: (from) => ({ ...from, lowestDeg: from.lowestDeg.map(() => null) }),
  },
  otherDates: {
    label: 'Look at the days after these',
    ask: (from) => ({ ...from, fromMs: from.fromMs + from.days * DAY_MS }),
  },
};

/** Why the question has no window, and the steps that would change that. */
export function NothingHere({ layers, question, onChange }: Props) {
  const { title, sentence, steps } = nothingFound(
    layers,
    question.lowestDeg.some((low) => low !== null),
  );
  return (
    <EmptyState title={title}>
      <p>{sentence}</p>
      <div className="row">
        {steps.map((step) => (
          <Button key={step} look="bare" onClick={() => onChange(STEPS[step].ask(question))}>
            {STEPS[step].label}
          </Button>
        ))}
      </div>
    </EmptyState>
  );
}
