import { useState } from 'react';
import { formatUtc } from '../../domain/time/format';
import {
  chanceWords,
  ledgerText,
  MODEL_ERROR_SENTENCE,
  type LinkSheets,
} from '../../domain/window/ledgerSheet';
import type { LinkMatrix as Matrix } from '../../domain/window/linkMatrix';
import { LedgerTerms, LinkLedger } from '../link/LinkLedger';
import { LinkMatrix } from '../link/LinkMatrix';
import { Button } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { FigureLabel } from '../ui/FigureLabel';

interface Props {
  /** Null while closed. */
  sheets: LinkSheets | null;
  /** All pairs of a round, of which `sheets` are one. */
  round: LinkRound | null;
  onClose: () => void;
}

export interface LinkRound {
  matrix: Matrix;
  pair: { first: number; second: number };
  onPair: (from: number, to: number) => void;
}

/** The link at the hand in both directions, with every term, and the same as text; of a round any pair's. */
export function LinkDialog({ sheets, round, onClose }: Props) {
  return (
    <Dialog
      wide
      open={sheets !== null}
      title={sheets ? `${round ? 'Links' : 'Link'} at ${formatUtc(sheets.timeMs)}` : ''}
      onClose={onClose}
    >
      {sheets ? <Content sheets={sheets} round={round} onClose={onClose} /> : null}
    </Dialog>
  );
}

function Content({ sheets, round, onClose }: Props & { sheets: LinkSheets }) {
  const [copied, setCopied] = useState<'yes' | 'no' | null>(null);
  const text = ledgerText(sheets);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(text);
      setCopied('yes');
    } catch {
      setCopied('no');
    }
  };
  return (
    <>
      {round ? (
        <>
          <p>{round.matrix.sentence}</p>
          <LinkMatrix {...round} />
          <h3>
            {sheets.directions[0].from} and {sheets.directions[0].to}
          </h3>
        </>
      ) : null}
      <p>
        {sheets.weaker} {MODEL_ERROR_SENTENCE}{' '}
        <FigureLabel figure="chance">Chance of a contact</FigureLabel> in a slot of{' '}
        {sheets.slotMinutes} minutes: <strong>{chanceWords(sheets.contactChance)}</strong>.
      </p>
      {sheets.notes.map((note) => (
        <p key={note} className="label">
          {note}
        </p>
      ))}
      <LinkLedger sheets={sheets} />
      <LedgerTerms sheets={sheets} />
      {copied === 'no' ? (
        <label className="field">
          <span className="field__label">
            The browser does not let this page copy. Take the text from here.
          </span>
          <textarea className="field__control ledger__text" readOnly rows={12} value={text} />
        </label>
      ) : null}
      <div className="row">
        <Button look="filled" onClick={onClose}>
          Back to the window
        </Button>
        <Button onClick={() => void copy()}>Copy as text</Button>
        <span role="status" className="label">
          {copied === 'yes' ? 'Copied.' : ''}
        </span>
      </div>
    </>
  );
}
