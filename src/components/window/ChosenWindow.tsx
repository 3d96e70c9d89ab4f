import { useQueryClient } from '@tanstack/react-query';
import { memo, useState } from 'react';
import { paths } from '../../paths';
import type { Answer } from './answer';
import type { Choice, Chosen } from './choice';
import { OfferPanel } from './OfferPanel';
import { heldSlot } from './slot';
import { WindowDetail } from './WindowDetail';

interface Props {
  answer: Answer;
  chosen: Chosen;
  onChoice: (choice: Choice) => void;
  signedIn: boolean;
  signInHref: string;
  nowMs: number;
}

interface Offered {
  id: string;
  sentence: string;
  warnings: string[];
}

/** The chosen window in full, and the offer that can be made of it. */
export const ChosenWindow = memo(function ChosenWindow({
  answer,
  chosen,
  onChoice,
  signedIn,
  signInHref,
  nowMs,
}: Props) {
  const [offered, setOffered] = useState<Offered | null>(null);
  const queries = useQueryClient();
  const { choice, window } = chosen;
  return (
    <WindowDetail
      answer={answer}
      index={chosen.index}
      cursorMs={choice.cursorMs}
      slot={choice.slot}
      onCursor={(cursorMs) => onChoice({ ...choice, cursorMs })}
      onSlot={(slot) => onChoice({ ...choice, slot: heldSlot(window, choice.slot, slot) })}
    >
      <OfferPanel
        slot={choice.slot}
        onSlot={(slot) => onChoice({ ...choice, slot })}
        stations={answer.stations}
        band={answer.question.band}
        mode={answer.question.mode}
        signedIn={signedIn}
        signInHref={signInHref}
        nowMs={nowMs}
        onOffered={(sked) => {
          setOffered(sked);
          void queries.invalidateQueries({ queryKey: ['searchData'] });
        }}
      />
      {offered ? (
        <div className="notice" role="status">
          <p>
            <strong>{offered.sentence}</strong> <a href={paths.sked(offered.id)}>Open the sked</a>
          </p>
          {offered.warnings.map((warning) => (
            <p key={warning}>{warning}</p>
          ))}
        </div>
      ) : null}
    </WindowDetail>
  );
});
