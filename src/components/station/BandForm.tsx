import { antennaFigures } from '../../domain/link/antenna';
import { bandById, type BandId } from '../../domain/station/bands';
import { antennaSchema } from '../../domain/station/equipmentSchema';
import type { NoiseRecord } from '../../domain/station/noiseRecord';
import type { Antenna, BandSetup, Polarization } from '../../domain/station/setup';
import { formatNumber } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { SelectField } from '../ui/Field';
import { ChainForm } from './ChainForm';
import { ExposureEstimate } from './ExposureEstimate';
import { FigureField } from './FigureField';
import { fieldId } from './useSave';

interface Props {
  band: BandId;
  setup: BandSetup;
  /** Noise record of this band. */
  newest: NoiseRecord | undefined;
  /** Path of the setup in what is saved, for the problems. */
  path: string;
  errorOf: (path: string) => string | undefined;
  onChange: (setup: BandSetup) => void;
  onRemove: () => void;
}

export const POLARIZATION_WORDS: Record<Polarization, string> = {
  horizontal: 'Horizontal',
  vertical: 'Vertical',
  rightCircular: 'Circular, transmits right-hand',
  leftCircular: 'Circular, transmits left-hand',
  rotatable: 'Linear, feed rotates',
};

/** Antenna, power and receiver on one band. */
export function BandForm({ band, setup, newest, path, errorOf, onChange, onRemove }: Props) {
  const { label, centreMhz } = bandById(band);
  const { antenna } = setup;
  const field = (name: string) => ({
    id: fieldId(`${path}.${name}`),
    error: errorOf(`${path}.${name}`),
  });
  const setAntenna = (changed: Antenna) => onChange({ ...setup, antenna: changed });
  return (
    <section className="stack ruled" aria-label={label}>
      <div className="row justify-between">
        <h2>{label}</h2>
        <Button look="bare" icon="trash" onClick={onRemove} aria-label={`Remove ${label}`}>
          Remove
        </Button>
      </div>
      <div className="form__pair">
        <SelectField
          {...field('antenna.kind')}
          label="Antenna"
          value={antenna.kind}
          onChange={(event) => setAntenna(newAntenna(event.target.value as Antenna['kind']))}
        >
          <option value="dish">Dish</option>
          <option value="gain">Yagis or other, gain known</option>
        </SelectField>
        <SelectField
          {...field('polarization')}
          label="Polarisation"
          value={setup.polarization}
          onChange={(event) =>
            onChange({ ...setup, polarization: event.target.value as Polarization })
          }
        >
          {Object.entries(POLARIZATION_WORDS).map(([value, text]) => (
            <option key={value} value={value}>
              {text}
            </option>
          ))}
        </SelectField>
        {antenna.kind === 'dish' ? (
          <>
            <FigureField
              {...field('antenna.diameterM')}
              label="Diameter, m"
              value={antenna.diameterM}
              onChange={(value) => setAntenna({ ...antenna, diameterM: value ?? NaN })}
            />
            <FigureField
              {...field('antenna.apertureEfficiency')}
              label="Efficiency, 0 to 1"
              value={antenna.apertureEfficiency}
              onChange={(value) => setAntenna({ ...antenna, apertureEfficiency: value ?? NaN })}
              note="0.5 to 0.6 for a well-lit prime-focus dish."
            />
          </>
        ) : (
          <>
            <FigureField
              {...field('antenna.gainDbi')}
              label="Gain, dBi"
              value={antenna.gainDbi}
              onChange={(value) => setAntenna({ ...antenna, gainDbi: value ?? NaN })}
              note="dBd plus 2.15."
            />
            <FigureField
              {...field('antenna.beamwidthDeg')}
              label="Beamwidth, ° (may be empty)"
              value={antenna.beamwidthDeg}
              onChange={(beamwidthDeg) => setAntenna({ ...antenna, beamwidthDeg })}
            />
          </>
        )}
      </div>
      <p className="quiet" role="status">
        {antennaSentence(antenna, centreMhz)}
      </p>
      <div className="form__pair">
        <FigureField
          {...field('powerAtFeedW')}
          label="Power at the feed, W"
          value={setup.powerAtFeedW}
          onChange={(value) => onChange({ ...setup, powerAtFeedW: value ?? NaN })}
          note="What arrives at the feed, after cable and relay."
        />
      </div>
      <ChainForm
        receive={setup.receive}
        antenna={antenna}
        frequencyMhz={centreMhz}
        newest={newest}
        path={`${path}.receive`}
        errorOf={errorOf}
        onChange={(receive) => onChange({ ...setup, receive })}
      />
      <ExposureEstimate band={band} antenna={antenna} powerAtFeedW={setup.powerAtFeedW} />
    </section>
  );
}

function newAntenna(kind: Antenna['kind']): Antenna {
  return kind === 'dish'
    ? { kind, diameterM: NaN, apertureEfficiency: 0.55 }
    : { kind, gainDbi: NaN };
}

function antennaSentence(antenna: Antenna, frequencyMhz: number): string {
  if (!antennaSchema.safeParse(antenna).success) {
    return 'Gain and beamwidth appear here.';
  }
  const { gainDbi, beamwidthDeg } = antennaFigures(antenna, frequencyMhz);
  return `Gain ${formatNumber(gainDbi, 1)} dBi, beam ${formatNumber(beamwidthDeg, 1)}° wide at half power.`;
}
