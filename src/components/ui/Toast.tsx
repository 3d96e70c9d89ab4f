import { useEffect, useState } from 'react';

interface Props {
  message: string;
  undo?: { label: string; run: () => void } | undefined;
  onDone: () => void;
}

const SHOWN_MS = 8000;

/** One sentence and one undo; leaves after 8 s unless it has the focus or the pointer. */
export function Toast({ message, undo, onDone }: Props) {
  const [held, setHeld] = useState(false);
  useEffect(() => {
    if (held) return;
    const timer = setTimeout(onDone, SHOWN_MS);
    return () => clearTimeout(timer);
  }, [held, message, onDone]);
  return (
    <div
      className="toast"
      role="status"
      onFocus={() => setHeld(true)}
      onBlur={() => setHeld(false)}
      onPointerEnter={() => setHeld(true)}
      onPointerLeave={() => setHeld(false)}
    >
      <p>{message}</p>
      {undo ? (
        <button type="button" onClick={undo.run}>
          {undo.label}
        </button>
      ) : null}
    </div>
  );
}
