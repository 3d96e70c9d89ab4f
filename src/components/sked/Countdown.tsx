import { useEffect, useState } from 'react';
import { countdownParts } from '../../domain/sked/countdown';
import { formatDuration } from '../../domain/time/format';

interface Props {
  startMs: number;
  endMs: number;
  /** The server's clock when the page was made; the browser's own may be wrong. */
  nowMs: number;
}

/** Time until a sked begins, then until it ends; a new figure each second, in its place. */
export function Countdown({ startMs, endMs, nowMs }: Props) {
  const [atMs, setAtMs] = useState(nowMs);
  useEffect(() => {
    const offsetMs = nowMs - Date.now();
    let timer: ReturnType<typeof setTimeout>;
    const tick = () => {
      const serverMs = Date.now() + offsetMs;
      setAtMs(serverMs);
      timer = setTimeout(tick, 1000 - (serverMs % 1000));
    };
    timer = setTimeout(tick, 1000 - (nowMs % 1000));
    return () => clearTimeout(timer);
  }, [nowMs]);
  const running = atMs >= startMs;
  const over = atMs >= endMs;
  const parts = countdownParts((running ? endMs : startMs) - atMs);
  const meaning = over
    ? 'The slot is over.'
    : running
      ? `Now, ${formatDuration(endMs - atMs)} left`
      : `In ${formatDuration(startMs - atMs)}`;
  return (
    <div role="timer" aria-label={meaning}>
      <p aria-hidden="true" className="flex flex-wrap items-baseline gap-x-3 whitespace-nowrap">
        {parts.map(({ figure, unit }) => (
          <span key={unit} className="inline-flex items-baseline gap-1.5">
            <span className="text-slot font-extralight tracking-[-0.03em] sm:text-countdown">
              {figure}
            </span>
            <span className="text-action text-ink2">{unit}</span>
          </span>
        ))}
      </p>
      <p aria-hidden="true" className="label min-h-[18px]">
        {over ? 'The slot is over.' : running ? 'now, until the slot ends' : ''}
      </p>
    </div>
  );
}
