import { leftOutNow, type TimetableView } from '../../../domain/activity/timetableView';
import { pairName } from './model';

interface Props {
  view: TimetableView;
  chosen: string | null;
  onChoose: (wishId: string) => void;
}

/** Wishes without a slot: why, and what would let them in. */
export function LeftOutList({ view, chosen, onChoose }: Props) {
  const all = leftOutNow(view);
  return (
    <section className="tt-left" aria-labelledby="tt-left-heading">
      <h2 id="tt-left-heading">
        Left out, {all.length} {all.length === 1 ? 'wish' : 'wishes'}
      </h2>
      {all.length === 0 ? <p className="quiet">Every wish has its slot.</p> : null}
      <ul>
        {all.map(({ wishId, why }) => (
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
    </section>
  );
}
