import { memo, useState } from 'react';
import { HOUR_MS } from '../../domain/time/interval';
import { gapSentence, totalWords } from '../../domain/window/sentences';
import { Button } from '../ui/Button';
import type { Answer } from './answer';
import { LostPanel } from './LostPanel';

/** The answer in a sentence, and on demand where the other hours went. */
export const Summary = memo(function Summary({ answer }: { answer: Answer }) {
  const [showLost, setShowLost] = useState(false);
  const { layers, question } = answer;
  const { count, total } = totalWords(layers.windows);
  const foundMs = layers.windows.reduce((sum, at) => sum + at.endMs - at.startMs, 0);
  return (
    <>
      <div className="windows__sum">
        <p role="status">
          <strong>{count}</strong>
          {total} {gapSentence(layers) ?? ''}
        </p>
        <div className="row no-print">
          <Button
            look="bare"
            icon="circleQuestionMark"
            aria-expanded={showLost}
            onClick={() => setShowLost(!showLost)}
          >
            Why not the other hours
          </Button>
          <Button look="bare" icon="printer" onClick={() => globalThis.print()}>
            Print the month
          </Button>
        </div>
      </div>
      {showLost ? (
        <LostPanel
          lost={layers.lost}
          totalHours={question.days * 24}
          foundHours={foundMs / HOUR_MS}
          degreesOf={answer.degreesOf}
        />
      ) : null}
    </>
  );
});
