import { useState } from 'react';
import { formatNumber } from '../../domain/time/format';
import { lowestElevationDeg } from '../../domain/window/layers';
import type { ChosenStation } from '../../domain/window/searchData';
import { Button } from '../ui/Button';
import { ValuePick } from './ValuePick';

interface Props {
  station: ChosenStation;
  asked: number | null;
  onChange: (lowestDeg: number | null) => void;
}

const HIGHEST_DEG = 60;

/** Lowest elevation of one station, by slider and by number; the month follows while it is dragged. */
export function ElevationPick({ station, asked, onChange }: Props) {
  const lowest = lowestElevationDeg(station, asked);
  const least = Math.max(0, station.sky.transmitElevationFromDeg ?? 0);
  const [text, setText] = useState<string | null>(null);
  const id = `lowest-${station.callSign}`;
  return (
    <ValuePick
      label={`Lowest elevation at ${station.callSign}`}
      value={`${formatNumber(lowest, lowest % 1 === 0 ? 0 : 1)}°`}
      beside={station.callSign}
    >
      {() => (
        <>
          <label className="field__label" htmlFor={id}>
            Lowest elevation at {station.callSign}
          </label>
          <div className="pick__slide">
            <input
              id={id}
              type="range"
              min={least}
              max={HIGHEST_DEG}
              step={0.5}
              value={lowest}
              onChange={(event) => {
                setText(null);
                onChange(Number(event.target.value));
              }}
            />
            <input
              className="field__control pick__number"
              aria-label={`Lowest elevation at ${station.callSign} in degrees`}
              inputMode="decimal"
              value={text ?? String(lowest)}
              onChange={(event) => {
                setText(event.target.value);
                const value = Number(event.target.value.replace(',', '.'));
                if (event.target.value.trim() !== '' && value >= least && value <= 89)
                  onChange(value);
              }}
              onBlur={() => setText(null)}
            />
            <span aria-hidden="true">°</span>
          </div>
          <p className="field__note">
            {station.sky.transmitElevationFromDeg === undefined
              ? 'Only for this question; the station keeps its own limits.'
              : `Only for this question. It does not transmit below ${formatNumber(least, 1)}°.`}
          </p>
          {asked === null ? null : (
            <Button look="bare" onClick={() => onChange(null)}>
              Back to the station’s own limit
            </Button>
          )}
        </>
      )}
    </ValuePick>
  );
}
