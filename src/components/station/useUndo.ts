import { useRef, useState } from 'react';

const MAX_STEPS = 200;

/** A value with its past. Changes of the same `step` in a row are taken back together. */
export function useUndo<T>(first: T) {
  const [value, setValue] = useState(first);
  const [past, setPast] = useState<T[]>([]);
  const lastStep = useRef<string | null>(null);
  return {
    value,
    canUndo: past.length > 0,
    change: (next: T, step: string): void => {
      if (step !== lastStep.current) setPast([...past.slice(1 - MAX_STEPS), value]);
      lastStep.current = step;
      setValue(next);
    },
    /** The next change is a step of its own, whatever its name. */
    rest: (): void => {
      lastStep.current = null;
    },
    undo: (): void => {
      const before = past.at(-1);
      if (before === undefined) return;
      setPast(past.slice(0, -1));
      setValue(before);
      lastStep.current = null;
    },
  };
}
