import type { SkyLimits } from '../../domain/sky';
import { FigureField } from './FigureField';
import { fieldId } from './useSave';

interface Props {
  sky: SkyLimits;
  errorOf: (path: string) => string | undefined;
  onChange: (part: Partial<SkyLimits>, step: string) => void;
}

/** What the rotators reach, and from where on it is safe to transmit. */
export function SkyRanges({ sky, errorOf, onChange }: Props) {
  const field = (name: Exclude<keyof SkyLimits, 'blocked' | 'horizon'>) => ({
    id: fieldId(`sky.${name}`),
    value: sky[name],
    error: errorOf(`sky.${name}`),
    onChange: (value: number | undefined) => onChange({ [name]: value }, name),
  });
  return (
    <fieldset className="group stack">
      <legend>What the dish reaches</legend>
      <p className="quiet">Leave a field empty where nothing limits.</p>
      <div className="form__pair">
        <FigureField {...field('elevationFromDeg')} label="Lowest elevation, °" />
        <FigureField {...field('elevationToDeg')} label="Highest elevation, °" />
        <FigureField
          {...field('azimuthFromDeg')}
          label="Azimuth from, °"
          note="Clockwise. 300 to 60 passes north."
        />
        <FigureField {...field('azimuthToDeg')} label="Azimuth to, °" />
      </div>
      <FigureField
        {...field('transmitElevationFromDeg')}
        label="Lowest elevation for transmitting, °"
        note="Below it you listen only: the beam would pass where people are. A contact needs both sides to transmit, so windows end there too. Drawn as a broken ring."
      />
    </fieldset>
  );
}
