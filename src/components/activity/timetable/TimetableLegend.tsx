import type { TimetableView } from '../../../domain/activity/timetableView';
import { bandById } from '../../../domain/station/bands';

/** What the signs of the timetable mean. */
export function TimetableLegend({ bands }: Pick<TimetableView, 'bands'>) {
  return (
    <ul className="tt-legend" aria-label="Signs">
      {bands.map(({ band }, index) => (
        <li key={band}>
          <span className={`tt-sign tt-slot--tone${Math.min(index, 3)}`} /> {bandById(band).label}
        </li>
      ))}
      <li>
        <span className="tt-sign tt-slot--tone0 tt-slot--pinned" /> fixed
      </li>
      <li>number: partner on the roster</li>
      <li>
        <svg width="26" height="14" aria-hidden="true">
          <path className="tt-hill" d="M0 14C6 14 7 2 13 2S20 14 26 14Z" />
        </svg>{' '}
        Moon’s height
      </li>
      <li>
        <svg width="26" height="14" aria-hidden="true">
          <rect width="26" height="14" fill="url(#tt-asleep)" />
        </svg>{' '}
        asleep, away or taken
      </li>
      <li>
        <span className="tt-sign tt-stretch tt-stretch--sign" /> may be dropped here
      </li>
    </ul>
  );
}
