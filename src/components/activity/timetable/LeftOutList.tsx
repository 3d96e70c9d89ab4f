import { memo, useMemo, useState } from 'react';
import { leftOutNow, type TimetableView } from '../../../domain/activity/timetableView';
import { pairName } from './model';

interface Props {
  view: TimetableView;
  chosen: string | null;
  onChoose: (wishId: string) => void;
}

const SHOWN_FIRST = 6;

/** Wishes without a slot: why, and what would let them in. Those that have starts come first, the most wanted of them before all. */
export const LeftOutList = memo(function LeftOutList({ view, chosen, onChoose }: Props) {
  const [whole, setWhole] = useState(false);
  const all = useMemo(() => {
    const wishes = new Map(view.problem.wishes.map((wish) => [wish.id, wish]));
    const hope = (id: string) => (wishes.get(id)!.options.length > 0 ? 1 : 0);
    return leftOutNow(view).sort(
      (a, b) =>
        hope(b.wishId) - hope(a.wishId) ||
        (b.why?.remedies.length ?? 0) - (a.why?.remedies.length ?? 0) ||
        wishes.get(b.wishId)!.priority - wishes.get(a.wishId)!.priority,
    );
  }, [view]);
  return (
    <section className="tt-left" aria-labelledby="tt-left-heading">
      <h2 id="tt-left-heading">
        Left out, {all.length} {all.length === 1 ? 'wish' : 'wishes'}
      </h2>
      {all.length === 0 ? <p className="quiet">Every wish has its slot.</p> : null}
      <ul>
        {(whole ? all : all.slice(0, SHOWN_FIRST)).map(({ wishId, why }) => (
          <li key={wishId}>
            <button
              type="button"
              className="tt-left__wish"
              aria-pressed={chosen === wishId}
              onClick={() => onChoose(wishId)}
            >
              {pairName(view, wishId)}
            </button>
            <span className="quiet">{why?.sentence ?? 'Taken out by hand.'}</span>
            {why?.remedies.map(({ sentence }) => (
              <span key={sentence} className="label">
                {sentence}
              </span>
            ))}
          </li>
        ))}
      </ul>
      {all.length > SHOWN_FIRST ? (
        <button
          type="button"
          className="tt-left__more"
          aria-expanded={whole}
          onClick={() => setWhole(!whole)}
        >
          {whole ? 'Show fewer' : `Show all ${all.length}`}
        </button>
      ) : null}
    </section>
  );
});
