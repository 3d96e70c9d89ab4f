import { useState } from 'react';
import { countdownParts } from '../../domain/sked/countdown';
import { liveState, lookAt, marginsAt, type LiveData } from '../../domain/sked/live';
import { marginWords } from '../../domain/sked/sheetWords';
import type { SkyLimits } from '../../domain/sky';
import { formatClock, formatDuration, formatNumber, formatUtc } from '../../domain/time/format';
import { HOUR_MS, MINUTE_MS } from '../../domain/time/interval';
import type { MoonPhase } from '../../domain/window/moonPhase';
import { Icon } from '../ui/Icon';
import { ContactSteps } from './ContactSteps';
import { LiveDials } from './LiveDials';
import { LiveSkies } from './LiveSkies';
import { LiveTurn } from './LiveTurn';
import { useClock } from './useClock';
import { useServerClock, type ClockDifference } from './useServerClock';
import { useWakeLock } from './useWakeLock';

interface Props {
  data: LiveData;
  skedId: string;
  /** "1296 MHz, Q65-60C" */
  bandAndMode: string;
  conventionLabel: string;
  ownSky: SkyLimits;
  phase: MoonPhase;
  /** Highest of the limits below which the station does not transmit; null where there is none. */
  lowestDeg: number | null;
  backHref: string;
  /** Null where there will be nothing to report. */
  reportHref: string | null;
  /** What the server's clock said when the page was made; the view goes by the device's from then on. */
  nowMs: number;
}

/** The hour itself, by the second: for a phone in the dark and for a desk. */
export function LiveView(props: Props) {
  const { data, skedId, nowMs: madeMs, lowestDeg } = props;
  const nowMs = useClock(madeMs);
  const difference = useServerClock();
  const wake = useWakeLock();
  const [chosen, setChosen] = useState(0);
  const partner = data.partners[chosen]!;
  const { plan } = data;
  const state = liveState(data, nowMs);
  // Long before the slot the dials and skies are those of its start.
  const near = nowMs >= data.track.startMs;
  const atMs = near ? Math.min(nowMs, plan.endMs) : plan.startMs;
  const margins = marginsAt(data, partner, atMs);
  const elevationDeg = lookAt(data, data.own, atMs)?.elevationDeg ?? null;
  return (
    <div className="live">
      <header className="live__head">
        <a href={props.backHref} className="live__tool" aria-label="Back to the sked">
          <Icon name="arrowLeft" />
        </a>
        <h1>
          <strong>{data.partners.map(({ callSign }) => callSign).join(', ')}</strong>{' '}
          <span>{props.bandAndMode}</span>
        </h1>
        <button type="button" className="live__tool" aria-label="Brightness" onClick={switchTheme}>
          <Icon name="sunMoon" />
        </button>
      </header>
      <div className="live__columns">
        <div className="live__column">
          <Clock state={state} plan={plan} nowMs={nowMs} />
          <LiveTurn
            state={state}
            own={data.own}
            periodMs={plan.periodMs}
            nowMs={nowMs}
            reportHref={props.reportHref}
          />
          {data.partners.length > 1 ? (
            <div className="segments" role="group" aria-label="Dials and steps towards">
              {data.partners.map(({ callSign }, index) => (
                <button
                  key={callSign}
                  type="button"
                  aria-pressed={index === chosen}
                  onClick={() => setChosen(index)}
                >
                  {callSign}
                </button>
              ))}
            </div>
          ) : null}
          <LiveDials
            data={data}
            partner={partner}
            conventionLabel={props.conventionLabel}
            atMs={atMs}
            turn={state.period && (state.period.callSign === data.own ? 'transmit' : 'listen')}
          />
          <ContactSteps
            storageKey={`echotide.contact.${skedId}.${partner.callSign}`}
            partner={partner.callSign}
            margin={margins && marginWords(margins.theyHearDb, margins.youHearDb)}
          />
        </div>
        <div className="live__column">
          <LiveSkies data={data} atMs={atMs} ownSky={props.ownSky} phase={props.phase} />
          {near ? null : (
            <p className="live__quiet">
              Dials and Moon as at the start, {formatUtc(plan.startMs)}.
            </p>
          )}
          <Caution lowestDeg={lowestDeg} elevationDeg={elevationDeg} />
          <div className="live__device">
            <button
              type="button"
              aria-pressed={wake.state === 'on'}
              disabled={wake.state === 'cannot'}
              onClick={wake.toggle}
            >
              {WAKE_WORDS[wake.state]}
            </button>
            <ClockNote difference={difference} />
          </div>
        </div>
      </div>
    </div>
  );
}

const WAKE_WORDS = {
  on: 'The screen stays on',
  off: 'The screen may go dark: keep it on',
  cannot: 'This browser cannot keep the screen on',
};

function switchTheme(): void {
  document.querySelector<HTMLButtonElement>('[data-theme-switch]')?.click();
}

function Clock({
  state,
  plan,
  nowMs,
}: {
  state: ReturnType<typeof liveState>;
  plan: LiveData['plan'];
  nowMs: number;
}) {
  const words = {
    before: `UTC, the sked begins ${plan.startMs - nowMs < 12 * HOUR_MS ? formatClock(plan.startMs) : formatUtc(plan.startMs)}`,
    running: `UTC, sked until ${formatClock(plan.endMs)}`,
    over: `UTC, the sked ended ${formatClock(plan.endMs)}`,
  };
  const parts = countdownParts(state.leftMs);
  const left = (state.leftMs > 10 * MINUTE_MS ? parts.filter(({ unit }) => unit !== 's') : parts)
    .map(({ figure, unit }) => `${figure} ${unit}`)
    .join(' ');
  return (
    <section className="live__clock" aria-label="Clock">
      <p className="live__time">
        <span className="live__hours">{formatClock(nowMs)}</span>
        <span className="live__figure">
          {String(new Date(nowMs).getUTCSeconds()).padStart(2, '0')}
        </span>
      </p>
      <p className="live__under">
        <span>{words[state.phase]}</span>
        {state.phase === 'over' ? null : (
          <span>{state.phase === 'before' ? `in ${left}` : `${left} left`}</span>
        )}
      </p>
    </section>
  );
}

function Caution({
  lowestDeg,
  elevationDeg,
}: {
  lowestDeg: number | null;
  elevationDeg: number | null;
}) {
  const low = lowestDeg !== null && elevationDeg !== null && elevationDeg < lowestDeg;
  return (
    <aside className="live__caution" aria-label="Cautions">
      <Icon name="triangleAlert" />
      <p>
        Transmitting: nobody in the beam or near the feed.{' '}
        {lowestDeg !== null && elevationDeg !== null ? (
          low ? (
            <strong className="text-signal">
              The Moon stands below your lowest elevation, {formatNumber(lowestDeg, 1)}°: do not
              transmit.
            </strong>
          ) : (
            `Lowest elevation ${formatNumber(lowestDeg, 1)}°, now ${formatNumber(elevationDeg, 1)}°.`
          )
        ) : null}{' '}
        Changeover checked before power. Wind stow in reach. Your national rules come first.
      </p>
    </aside>
  );
}

/** A T/R plan depends on the clock; beyond this it must be set. */
const WARN_FROM_MS = 1000;

function ClockNote({ difference }: { difference: ClockDifference | null }) {
  if (!difference) return <p className="live__quiet">Clock: this device’s own.</p>;
  const { aheadMs, uncertaintyMs } = difference;
  const off = Math.abs(aheadMs);
  const figure = off < 2 * MINUTE_MS ? `${formatNumber(off / 1000, 1)} s` : formatDuration(off);
  const words = `${figure} ${aheadMs >= 0 ? 'ahead of' : 'behind'} the server’s`;
  return off - uncertaintyMs > WARN_FROM_MS ? (
    <p className="live__clockwarning" role="alert">
      <Icon name="triangleAlert" />
      <span>This device’s clock is {words}. Set it: who transmits when depends on it.</span>
    </p>
  ) : (
    <p className="live__quiet">
      Clock: this device’s own, {words}, to {formatNumber(Math.max(uncertaintyMs, 50) / 1000, 1)} s.
    </p>
  );
}
