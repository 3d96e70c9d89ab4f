import { useState } from 'react';
import { bandById, BAND_IDS, type BandId } from '../../domain/station/bands';
import type { NoiseRecord } from '../../domain/station/noiseRecord';
import type { BandEquipment } from '../../domain/station/views';
import { formatNumber } from '../../domain/time/format';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { SelectField } from '../ui/Field';
import { ProblemSummary } from '../ui/Notices';
import { Toast } from '../ui/Toast';
import { NoisePlot } from './NoisePlot';
import { NoiseRecordForm } from './NoiseRecordForm';
import { NoiseTable } from './NoiseTable';
import { recordDay } from './noiseWords';
import { sendJson } from './useSave';

interface Props {
  stationId: string;
  /** Newest first. */
  records: NoiseRecord[];
  /** As saved. */
  equipment: BandEquipment[];
  today: string;
  onChange: (records: NoiseRecord[]) => void;
}

/** What was measured of each band's noise: table, course over time, and a form for more. */
export function NoiseRecords({ stationId, records, equipment, today, onChange }: Props) {
  const bands = BAND_IDS.filter(
    (id) => equipment.some(({ band }) => band === id) || records.some(({ band }) => band === id),
  );
  const [chosen, setChosen] = useState<BandId | null>(null);
  const [removing, setRemoving] = useState<NoiseRecord | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const [done, setDone] = useState<string | null>(null);
  const band =
    (chosen && bands.includes(chosen) ? chosen : null) ?? records[0]?.band ?? bands[0] ?? null;
  const setup = equipment.find((entry) => entry.band === band)?.setup ?? null;
  const shown = records.filter((record) => record.band === band);

  const reload = async () => {
    const response = await fetch(paths.api.stationNoise(stationId));
    if (response.ok) onChange(((await response.json()) as { records: NoiseRecord[] }).records);
  };
  const remove = async (record: NoiseRecord) => {
    setRemoving(null);
    const answer = await sendJson('DELETE', paths.api.stationNoiseRecord(stationId, record.id));
    setProblem(answer.ok ? null : answer.message);
    if (answer.ok) setDone(`The record of ${recordDay(record.measuredOn)} is removed.`);
    await reload();
  };

  return (
    <section className="mt-8" aria-labelledby="measured-noise">
      <h2 id="measured-noise" className="ruled">
        Measured noise
      </h2>
      <p className="quiet mb-4">
        A step in noise tells the system temperature better than any data sheet. The newest record
        can be what margins are computed from: choose it as the receiver of the band above.
      </p>
      {band === null ? (
        <p>Save the equipment of a band first; its measurements come here.</p>
      ) : (
        <div className="columns columns--margin">
          <div className="stack">
            <ProblemSummary
              title="Nothing was removed"
              problems={problem ? [{ message: problem }] : []}
            />
            {bands.length > 1 ? (
              <div className="w-40">
                <SelectField
                  id="noise-band"
                  label="Band"
                  value={band}
                  onChange={(event) => setChosen(event.target.value as BandId)}
                >
                  {bands.map((id) => (
                    <option key={id} value={id}>
                      {bandById(id).label}
                    </option>
                  ))}
                </SelectField>
              </div>
            ) : null}
            {shown.length === 0 ? (
              <p>Nothing measured on {bandById(band).label} yet.</p>
            ) : (
              <>
                <NoiseTable
                  records={shown}
                  newestUsed={
                    setup?.receive.kind === 'measured' && setup.receive.fromNewestRecord === true
                  }
                  onRemove={setRemoving}
                />
                <NoisePlot records={shown} />
              </>
            )}
          </div>
          <NoiseRecordForm
            key={band}
            {...{ stationId, band, today }}
            antenna={setup?.antenna ?? null}
            onAdded={(record) => {
              setProblem(null);
              setDone(
                `Kept: ${formatNumber(record.figures.systemTemperatureK, 1)} K on ${bandById(record.band).label}.`,
              );
              void reload();
            }}
          />
        </div>
      )}
      <Dialog
        open={removing !== null}
        title={`Remove the record of ${removing ? recordDay(removing.measuredOn) : ''}?`}
        onClose={() => setRemoving(null)}
      >
        <p>What was measured is gone then. It cannot be brought back.</p>
        <div className="row">
          <Button look="harmful" onClick={() => removing && void remove(removing)}>
            Remove the record
          </Button>
          <Button onClick={() => setRemoving(null)}>Keep it</Button>
        </div>
      </Dialog>
      {done ? <Toast message={done} onDone={() => setDone(null)} /> : null}
    </section>
  );
}
