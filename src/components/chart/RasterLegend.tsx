import { FigureLabel } from '../ui/FigureLabel';
import { QUALITY_NAMES, scaleWords, type QualityBasis } from '../../domain/window/quality';

interface Props {
  basis: QualityBasis;
  /** Call signs in the order of the question. */
  callSigns: string[];
  /** Whether anybody's hours are known; else there is no grey ground to explain. */
  hoursKnown: boolean;
  /** Whether hours count; else the thin line stands for short or limited stretches only. */
  countsHours: boolean;
  skeds: boolean;
}

/** Every sign of the raster with its word. */
export function RasterLegend({ basis, callSigns, hoursKnown, countsHours, skeds }: Props) {
  const [first, second] = callSigns;
  return (
    <div className="legend">
      <ul>
        <li>
          <span>
            <FigureLabel figure={basis}>{QUALITY_NAMES[basis]}</FigureLabel>, dB
          </span>
        </li>
        {scaleWords(basis).map(({ step, words }) => (
          <li key={step}>
            <span className={`legend__band chip--${step}`} />
            {step} {words}
          </li>
        ))}
        {basis === 'margin' ? (
          <li>
            <span className="legend__band chip--below" />
            below under 0.0
          </li>
        ) : null}
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
