import { useState } from 'react';
import type { z } from 'zod';
import { useSave, useUnsavedWarning } from './useSave';

interface Options {
  url: string;
  schema: z.ZodType;
  version: number;
  /** Where to go after saving; absent: stay and say so. */
  next?: string | undefined;
  onSaved?: (() => void) | undefined;
}

/** State of a page that edits one part of a station: dirty or saved, and the version to save over. */
export function useEditor({ url, schema, version, next, onSaved }: Options) {
  const [current, setCurrent] = useState(version);
  const [unsaved, setUnsaved] = useState(false);
  const [leaving, setLeaving] = useState(false);
  const [saved, setSaved] = useState(false);
  const saving = useSave<{ version: number }>('PUT', url, schema);
  useUnsavedWarning(unsaved && !leaving);

  return {
    ...saving,
    saving: saving.saving || leaving,
    unsaved,
    saved,
    forgetSaved: () => setSaved(false),
    touch: () => setUnsaved(true),
    async submit(body: object): Promise<void> {
      const answer = await saving.save({ ...body, version: current });
      if (!answer) return;
      setCurrent(answer.version);
      setUnsaved(false);
      onSaved?.();
      if (next) {
        setLeaving(true);
        window.location.assign(next);
      } else {
        setSaved(true);
      }
    },
  };
}

export type Editor = ReturnType<typeof useEditor>;
