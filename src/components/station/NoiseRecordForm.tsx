import { useState } from 'react';
import { antennaFigures } from '../../domain/link/antenna';
import {
  noiseFigures,
  systemKForTenthDb,
  type NoiseMeasurement,
} from '../../domain/link/measuredNoise';
import { bandById, type BandId } from '../../domain/station/bands';
import {
  noiseRecordSchema,
  type FluxAt,
  type NoiseMethod,
  type NoiseRecord,
} from '../../domain/station/noiseRecord';
import type { Antenna } from '../../domain/station/setup';
import { formatNumber } from '../../domain/time/format';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { SelectField, TextField } from '../ui/Field';
import { IslandForm } from '../ui/IslandForm';
import { ProblemSummary } from '../ui/Notices';
import { FigureField } from './FigureField';
import { fieldId, useSave } from './useSave';

interface Props {
  stationId: string;
  band: BandId;
  /** As saved; null: the band has no saved equipment. */
  antenna: Antenna | null;
  today: string;
  onAdded: (record: NoiseRecord) => void;
}

const ROOM_K = 290;

/** Enters one measurement of a band's noise, with what follows from it while typing. */
export function NoiseRecordForm({ stationId, band, antenna, today, onAdded }: Props) {
  const [method, setMethod] = useState<NoiseMethod>('hotCold');
  const [measuredOn, setMeasuredOn] = useState(today);
  const [yDb, setYDb] = useState<number | undefined>();
  const [hotK, setHotK] = useState<number | undefined>(ROOM_K);
  const [coldK, setColdK] = useState<number | undefined>();
  const [fluxSfu, setFluxSfu] = useState<number | undefined>();
  const [fluxAt, setFluxAt] = useState<FluxAt>('10cm');
  const [note, setNote] = useState('');
  const { save, saving, problems, errorOf } = useSave<NoiseRecord>(
    'POST',
    paths.api.stationNoise(stationId),
    noiseRecordSchema,
  );
  const own = method === 'hotCold' ? { hotK, coldK } : { fluxSfu, fluxAt };
  const input = { method, band, measuredOn, yDb, note, ...own };
  const field = (name: string) => ({ id: fieldId(`noise.${name}`), error: errorOf(name) });
  const submit = async () => {
    const record = await save(input);
    if (!record) return;
    onAdded(record);
    setYDb(undefined);
    setNote('');
  };
  return (
    <IslandForm
      noValidate
      className="stack"
      onSubmit={(event) => {
        event.preventDefault();
        void submit();
      }}
    >
      <h3 className="font-semibold">Add a measurement on {bandById(band).label}</h3>
      <ProblemSummary
        title="The measurement was not kept"
        problems={problems.map((problem) => ({
          ...problem,
          fieldId: problem.fieldId?.replace(/^field-/, 'field-noise-'),
        }))}
      />
      <SelectField
        {...field('method')}
        label="Step between"
        value={method}
        onChange={(event) => setMethod(event.target.value as NoiseMethod)}
      >
        <option value="hotCold">Hot load and cold sky</option>
        <option value="sun">Cold sky and the Sun</option>
      </SelectField>
      <div className="form__pair">
        <TextField
          {...field('measuredOn')}
          type="date"
          label="Day, UTC"
          max={today}
          value={measuredOn}
          onChange={(event) => setMeasuredOn(event.target.value)}
        />
        <FigureField {...field('yDb')} label="Step, dB" value={yDb} onChange={setYDb} />
        {method === 'hotCold' ? (
          <>
            <FigureField
              {...field('hotK')}
              label="Hot load, K"
              value={hotK}
              onChange={setHotK}
              note="290 for a load at 17 °C."
            />
            <FigureField
              {...field('coldK')}
              label="Cold sky, K"
              value={coldK}
              onChange={setColdK}
              note="What the antenna hears: sky, air and ground together."
            />
          </>
        ) : (
          <>
            <FigureField
              {...field('fluxSfu')}
              label="Flux of the Sun, SFU"
              value={fluxSfu}
              onChange={setFluxSfu}
            />
            <SelectField
              {...field('fluxAt')}
              label="Flux measured at"
              value={fluxAt}
              onChange={(event) => setFluxAt(event.target.value as FluxAt)}
            >
              <option value="10cm">10.7 cm, carried to the band</option>
              <option value="band">The band itself</option>
            </SelectField>
          </>
        )}
      </div>
      <TextField
        {...field('note')}
        label="Note (may be empty)"
        maxLength={200}
        autoComplete="off"
        value={note}
        onChange={(event) => setNote(event.target.value)}
      />
      <p role="status" className="quiet">
        {preview(input, antenna)}
      </p>
      <div>
        <Button type="submit" disabled={saving}>
          {saving ? 'Adding' : 'Add the measurement'}
        </Button>
      </div>
      <p className="label">
        {method === 'hotCold'
          ? 'A load in place of the feed, then the feed on cold sky. The load’s relay counts as part of the receiver.'
          : 'Peak on the Sun against cold sky at the same elevation. The flux carried from 10.7 cm is right to about 30 %, which is 1.1 dB of G/T; bursts spoil it.'}
      </p>
    </IslandForm>
  );
}

function preview(input: object & { band: BandId }, antenna: Antenna | null): string {
  const checked = noiseRecordSchema.safeParse({ ...input, measuredOn: '2000-01-01' });
  if (!checked.success) return 'What follows from it appears here.';
  const { data } = checked;
  const { centreMhz } = bandById(data.band);
  if (data.method === 'sun' && !antenna) return 'Save the antenna of this band first.';
  const measurement: NoiseMeasurement =
    data.method === 'hotCold' ? data : { ...data, ...antennaFigures(antenna!, centreMhz) };
  try {
    const figures = noiseFigures(measurement, centreMhz);
    const wrongK = systemKForTenthDb(measurement, centreMhz);
    return [
      `System ${formatNumber(figures.systemTemperatureK, 1)} K`,
      figures.receiverTemperatureK === null
        ? ''
        : `, receiver ${formatNumber(figures.receiverTemperatureK, 1)} K, noise figure ${formatNumber(figures.noiseFigureDb ?? NaN, 2)} dB`,
      figures.gainOverTemperatureDb === null
        ? ''
        : `, G/T ${formatNumber(figures.gainOverTemperatureDb, 1)} dB/K`,
      Number.isFinite(wrongK)
        ? `. Reading the step 0.1 dB wrong moves the system by ${formatNumber(wrongK, 1)} K.`
        : '. A step this small is within the reading error.',
    ].join('');
  } catch (error) {
    return error instanceof Error ? error.message : '';
  }
}
