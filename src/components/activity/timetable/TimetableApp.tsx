import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useCallback, useEffect, useState } from 'react';
import { leftOutNow } from '../../../domain/activity/timetableView';
import { Button } from '../../ui/Button';
import { Toast } from '../../ui/Toast';
import { LeftOutList } from './LeftOutList';
import { SlotList } from './SlotList';
import { SlotPanel } from './SlotPanel';
import { TimetableGrid } from './TimetableGrid';
import { TimetableLegend } from './TimetableLegend';
import { useDraft } from './useDraft';
import { useHold } from './useHold';

interface Props {
  slug: string;
  /** When the page was made; slots before it stay. */
  nowMs: number;
}

const queryClient = new QueryClient();

/** The draft of a plan, moved about by hand. */
export default function TimetableApp(props: Props) {
  return (
    <QueryClientProvider client={queryClient}>
      <Timetable {...props} />
    </QueryClientProvider>
  );
}

function Timetable({ slug, nowMs }: Props) {
  const draft = useDraft(slug);
  const [chosen, setChosen] = useState<string | null>(null);
  const now = useCallback(() => nowMs, [nowMs]);
  const hold = useHold(draft.view, draft.change, now);
  const { view, undo } = draft;

  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (!(event.ctrlKey || event.metaKey) || event.key.toLowerCase() !== 'z' || !undo) return;
      if (event.target instanceof HTMLInputElement) return;
      event.preventDefault();
      undo();
    };
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  }, [undo]);

  if (!view) {
    return (
      <p role={draft.problem ? 'alert' : 'status'}>
        {draft.problem ?? 'The timetable is being loaded.'}
      </p>
    );
  }
  const shown = hold.held?.slot.wishId ?? chosen;
  const placed = view.slots.length;
  return (
    <div className="tt">
      <div className="tt-bar">
        <p>
          {view.stations.length} stations, {placed} of {placed + leftOutNow(view).length} wishes
          placed, no double booking
        </p>
        <Button look="bare" icon="undo" disabled={!undo} onClick={() => undo?.()}>
          Undo
        </Button>
      </div>
      <div className="tt-work">
        <div className="min-w-0">
          <TimetableGrid view={view} hold={hold} chosen={shown} onChoose={setChosen} />
          <SlotList view={view} chosen={shown} onChoose={setChosen} />
          <TimetableLegend bands={view.bands} />
        </div>
        <div className="tt-side">
          {shown && view.problem.wishes.some(({ id }) => id === shown) ? (
            <SlotPanel
              key={shown}
              view={view}
              wishId={shown}
              heldMs={hold.held ? hold.held.targetMs : null}
              nowMs={nowMs}
              change={draft.change}
            />
          ) : (
            <p className="quiet">
              Choose a slot to see its figures and where else it may stand. Drag it, or press Enter
              on it and move it with the arrows.
            </p>
          )}
          <LeftOutList view={view} chosen={shown} onChoose={setChosen} />
        </div>
      </div>
      <p className="sr-only" role="status">
        {hold.held
          ? hold.held.targetMs === null
            ? 'No free start here.'
            : `Held over ${new Date(hold.held.targetMs).toISOString().slice(11, 16)} UTC.`
          : ''}
      </p>
      {draft.refused ? <Toast message={draft.refused} onDone={draft.forgetRefusal} /> : null}
    </div>
  );
}
