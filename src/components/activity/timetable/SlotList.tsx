import { memo } from 'react';
import type { TimetableView } from '../../../domain/activity/timetableView';
import { bandById, type BandId } from '../../../domain/station/bands';
import { formatUtcRange } from '../../../domain/time/format';
import { pairOf } from './model';
import { endOf } from './SlotPanel';

interface Props {
  view: TimetableView;
  chosen: string | null;
  onChoose: (wishId: string) => void;
}

/** The same plan as a list of slots by station: on a phone instead of the table. */
export const SlotList = memo(function SlotList({ view, chosen, onChoose }: Props) {
  return (
    <div className="tt-list">
      {view.stations.map((station, index) => {
        const own = view.slots
          .map((slot) => ({ slot, pair: pairOf(view.problem, slot.wishId) }))
          .filter(({ pair }) => pair.first === index || pair.second === index)
          .sort((a, b) => a.slot.startMs - b.slot.startMs);
        return (
          <section key={station.id} aria-label={station.callSign}>
            <h3>
              <span className="quiet">{station.place}</span> {station.callSign}{' '}
              <span className="label">{station.name}</span>
            </h3>
            {own.length === 0 ? <p className="quiet">No slot.</p> : null}
            <ul>
              {own.map(({ slot, pair }) => {
                const partner = view.stations[pair.first === index ? pair.second : pair.first]!;
                const time = { startMs: slot.startMs, endMs: endOf(view, slot.startMs) };
                return (
                  <li key={slot.wishId}>
                    <button
                      type="button"
                      aria-pressed={chosen === slot.wishId}
                      onClick={() => onChoose(slot.wishId)}
                    >
                      {formatUtcRange(time)} <strong>{partner.callSign}</strong>,{' '}
                      {bandById(slot.band as BandId).label}
                      {slot.pinned ? ', fixed' : ''}
                    </button>
                  </li>
                );
              })}
            </ul>
          </section>
        );
      })}
    </div>
  );
});
