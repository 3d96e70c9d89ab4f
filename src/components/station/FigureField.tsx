import { useState, type ReactNode } from 'react';
import { TextField } from '../ui/Field';
import { readFigure, showFigure } from './readFigure';

interface Props {
  id: string;
  label: ReactNode;
  /** NaN: what stands in the field is no number. */
  value: number | undefined;
  onChange: (value: number | undefined) => void;
  onBlur?: (() => void) | undefined;
  note?: ReactNode | undefined;
  error?: string | undefined;
  disabled?: boolean | undefined;
  'aria-label'?: string | undefined;
}

/** A field for a number. What was typed stays as it was typed until the number changes elsewhere. */
export function FigureField({ value, onChange, ...rest }: Props) {
  const [typed, setTyped] = useState(() => showFigure(value));
  const read = readFigure(typed);
  const same = Object.is(read, value) || (read === undefined && Number.isNaN(value));
  return (
    <TextField
      {...rest}
      inputMode="decimal"
      autoComplete="off"
      value={same ? typed : showFigure(value)}
      onChange={(event) => {
        setTyped(event.target.value);
        onChange(readFigure(event.target.value));
      }}
    />
  );
}
