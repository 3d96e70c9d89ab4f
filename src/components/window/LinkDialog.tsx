import { useState } from 'react';
import { formatUtc } from '../../domain/time/format';
import {
  chanceWords,
  ledgerText,
  MODEL_ERROR_SENTENCE,
  type LinkSheets,
} from '../../domain/window/ledgerSheet';
import { LedgerTerms, LinkLedger } from '../link/LinkLedger';
import { Button } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { FigureLabel } from '../ui/FigureLabel';

interface Props {
  /** Null while closed. */
  sheets: LinkSheets | null;
  onClose: () => void;
}

/** The link at the hand in both directions, with every term, and the same as text. */
export function LinkDialog({ sheets, onClose }: Props) {
  return (
    <Dialog
      wide
      open={sheets !== null}
      title={sheets ? `Link at ${formatUtc(sheets.timeMs)}` : ''}
      onClose={onClose}
    >
      {sheets ? <Content sheets={sheets} onClose={onClose} /> : null}
    </Dialog>
  );
}

function Content({ sheets, onClose }: { sheets: LinkSheets; onClose: () => void }) {
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
