import { formatNumber } from '../../domain/time/format';
import { QUALITY_NAME, QUALITY_SCALE } from '../../domain/window/quality';

interface Props {
  /** Call signs in the order of the question. */
  callSigns: string[];
  /** Whether anybody's hours are known; else there is no grey ground to explain. */
  hoursKnown: boolean;
  /** Whether hours count; else the thin line stands for short or limited stretches only. */
  countsHours: boolean;
  skeds: boolean;
}

/** Every sign of the raster with its word. */
export function RasterLegend({ callSigns, hoursKnown, countsHours, skeds }: Props) {
  const [first, second] = callSigns;
  return (
    <div className="legend">
      <ul>
        {QUALITY_SCALE.map(({ step }, index) => (
          <li key={step}>
            <span className={`legend__band chip--${step}`} />
            {step} {rangeWords(index)}
          </li>
        ))}
        <li>dB of {QUALITY_NAME.toLowerCase()}, as a loss</li>
      </ul>
      <ul>
        <li>
          <span className="legend__line" />
          {countsHours && hoursKnown
            ? 'clear, but outside someone’s hours or your limits'
            : 'clear, but too short or outside your limits'}
        </li>
        <li>
          <span className="legend__hatch" />
          Moon hidden or too low
        </li>
        {skeds ? (
          <>
            <li>
              <span className="legend__sked" />
              sked
            </li>
            <li>
              <span className="legend__sked legend__sked--offered" />
              offer
            </li>
          </>
        ) : null}
      </ul>
      {hoursKnown ? (
        <p>
          Grey ground: asleep or away
          {callSigns.length === 2
            ? `, ${first} in the upper half of a row, ${second} in the lower.`
            : '; the darker, the more stations.'}
        </p>
      ) : null}
    </div>
  );
}

/** "under −4.0" for the weakest step, "from −2.5" for the others. */
function rangeWords(index: number): string {
  const { fromDb } = QUALITY_SCALE[index]!;
  if (Number.isFinite(fromDb)) return `from ${formatNumber(fromDb, 1)}`;
  const next = QUALITY_SCALE[index + 1];
  return next ? `under ${formatNumber(next.fromDb, 1)}` : '';
}
