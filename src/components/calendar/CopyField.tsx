import { useEffect, useState } from 'react';
import { Button } from '../ui/Button';
import { TextField } from '../ui/Field';

interface Props {
  id: string;
  label: string;
  value: string;
}

/** A text to take along: to mark by hand, and with scripts to copy by a button. */
export function CopyField({ id, label, value }: Props) {
  const [awake, setAwake] = useState(false);
  const [copied, setCopied] = useState<boolean | null>(null);
  useEffect(() => setAwake(true), []);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(value);
      setCopied(true);
    } catch {
      setCopied(false);
    }
  };
  return (
    <div className="flex flex-wrap items-end gap-3">
      <div className="min-w-0 grow">
        <TextField
          id={id}
          label={label}
          value={value}
          readOnly
          onFocus={(event) => event.currentTarget.select()}
        />
      </div>
      {awake ? (
        <Button onClick={() => void copy()}>{copied ? 'Copied' : 'Copy the address'}</Button>
      ) : null}
      <p className="label basis-full" role="status">
        {copied === false ? 'The browser did not copy it. Mark it and copy it by hand.' : ''}
      </p>
    </div>
  );
}
