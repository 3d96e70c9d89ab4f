import { useState } from 'react';
import { formatLocalRange } from '../../domain/time/format';
import type { Interval } from '../../domain/time/interval';
import { isTimeZone } from '../../domain/time/zoneName';

interface Props {
  time: Interval;
  /** The zone in which the page shows the reader's times. */
  timeZone: string;
  /** Page on which the zone can be changed; "?zone=" is added. */
  changeAt: string | null;
}

/** The slot in the zone of this browser, where that shows another clock than the page. */
export default function OwnZone({ time, timeZone, changeAt }: Props) {
  const [own] = useState(() => new Intl.DateTimeFormat().resolvedOptions().timeZone);
  if (!own || !isTimeZone(own) || own === timeZone) return null;
  const here = formatLocalRange(time, own);
  if (here === formatLocalRange(time, timeZone)) return null;
  return (
    <p className="label">
      This browser is in {own}: {here}.{' '}
      {changeAt ? <a href={`${changeAt}?zone=${encodeURIComponent(own)}`}>Use that zone</a> : null}
    </p>
  );
}
