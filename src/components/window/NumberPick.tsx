import { useState } from 'react';
import { formatNumber } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { ValuePick } from './ValuePick';

interface Props {
  label: string;
  unit: string;
  value: number;
  least: number;
  most: number;
  step: number;
  note: string;
  /** Null drops the limit. */
  onChange: (value: number | null) => void;
}

/** A limit of the sentence by slider and number, which can be dropped again. */
export function NumberPick({ label, unit, value, least, most, step, note, onChange }: Props) {
  const [text, setText] = useState<string | null>(null);
  const decimals = step < 1 ? 1 : 0;
  const id = label.replaceAll(' ', '-');
  const shown = `${formatNumber(value, decimals)}${unit === '°' ? '' : ' '}${unit}`;
  return (
    <ValuePick label={label} value={shown}>
      {() => (
        <>
          <label className="field__label" htmlFor={id}>
            {label}
          </label>
          <div className="pick__slide">
            <input
              id={id}
              type="range"
              min={least}
              max={most}
              step={step}
              value={value}
              onChange={(event) => {
                setText(null);
                onChange(Number(event.target.value));
              }}
            />
            <input
              className="field__control pick__number"
              aria-label={`${label} in ${unit === '°' ? 'degrees' : unit}`}
              inputMode="decimal"
              value={text ?? String(value)}
              onChange={(event) => {
                setText(event.target.value);
                const typed = Number(event.target.value.replace(',', '.'));
                if (event.target.value.trim() !== '' && typed >= least && typed <= most) {
                  onChange(typed);
                }
              }}
              onBlur={() => setText(null)}
            />
            <span aria-hidden="true">{unit}</span>
          </div>
          <p className="field__note">{note}</p>
          <Button look="bare" icon="trash" onClick={() => onChange(null)}>
            Drop this limit
          </Button>
        </>
      )}
    </ValuePick>
  );
}
