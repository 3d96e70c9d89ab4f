import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { TimetableView } from '../../../domain/activity/timetableView';
import { fetchDraft, sendChange } from './draftApi';
import { applied, inverseOf, type Change } from './model';

const MOST_UNDONE = 100;

export interface Draft {
  view: TimetableView | undefined;
  /** Why it could not be loaded. */
  problem: string | null;
  /** Makes a change at once here and then on the server; a refusal puts everything back. */
  change: (change: Change) => void;
  undo: (() => void) | null;
  busy: boolean;
  /** What was refused last, in words. */
  refused: string | null;
  forgetRefusal: () => void;
}

/** The draft as it is edited: changes show before the server has answered, one after the other is sent. */
export function useDraft(slug: string): Draft {
  const client = useQueryClient();
  const key = ['draft', slug];
  const query = useQuery({
    queryKey: key,
    queryFn: () => fetchDraft(slug),
    refetchOnWindowFocus: false,
    retry: 1,
  });
  const [undoable, setUndoable] = useState<Change[]>([]);
  const [refused, setRefused] = useState<string | null>(null);

  const mutation = useMutation({
    // One after the other: each is based on the version that the one before made.
    scope: { id: `draft ${slug}` },
    mutationFn: ({ change }: { change: Change; isUndo: boolean }) =>
      sendChange(slug, client.getQueryData<TimetableView>(key)!.version, change),
    onMutate: ({ change, isUndo }) => {
      const before = client.getQueryData<TimetableView>(key)!;
      client.setQueryData(key, applied(before, change));
      setRefused(null);
      setUndoable((all) =>
        isUndo ? all.slice(0, -1) : [...all, inverseOf(before, change)].slice(-MOST_UNDONE),
      );
    },
    onSuccess: ({ version, slot: figures }, { change: { wishId } }) => {
      client.setQueryData<TimetableView>(
        key,
        (now) =>
          now && {
            ...now,
            version,
            slots: now.slots.map((slot) =>
              figures && slot.wishId === wishId ? { ...slot, ...figures } : slot,
            ),
          },
      );
    },
    onError: async (error, { isUndo }) => {
      setRefused(error.message);
      if (!isUndo) setUndoable((all) => all.slice(0, -1));
      await client.invalidateQueries({ queryKey: key });
    },
  });
  const last = undoable.at(-1);
  return {
    view: query.data,
    problem: query.error ? query.error.message : null,
    change: (change) => mutation.mutate({ change, isUndo: false }),
    undo: last ? () => mutation.mutate({ change: last, isUndo: true }) : null,
    busy: mutation.isPending,
    refused,
    forgetRefusal: () => setRefused(null),
  };
}
