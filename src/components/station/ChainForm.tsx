import { useMemo } from 'react';
import { chainReport, coldSkyK } from '../../domain/link/chainReport';
import { chainTemperatureK, noiseFigureDb } from '../../domain/link/receiveChain';
import { antennaSchema, receiveChainSchema } from '../../domain/station/equipmentSchema';
import type { NoiseRecord } from '../../domain/station/noiseRecord';
import type { Antenna, ReceiveChain } from '../../domain/station/setup';
import { formatNumber } from '../../domain/time/format';
import { SelectField } from '../ui/Field';
import { ChainPicture } from './ChainPicture';
import { ChainResult } from './ChainResult';
import { FigureField } from './FigureField';
import { noiseWords } from './noiseWords';
import { newStage, StageList } from './StageList';
import { fieldId } from './useSave';

interface Props {
  receive: ReceiveChain;
  /** For the cold sky in its beam. */
  antenna: Antenna;
  frequencyMhz: number;
  /** Of this band. */
  newest: NoiseRecord | undefined;
  path: string;
  errorOf: (path: string) => string | undefined;
  onChange: (receive: ReceiveChain) => void;
}

type Known = 'figure' | 'record' | 'stages';

/** The receiver: one measured figure, the newest noise record, or stage by stage from the feed on. */
export function ChainForm(props: Props) {
  const { receive, newest, path, errorOf, onChange } = props;
  const field = (name: string) => ({
    id: fieldId(`${path}.${name}`),
    error: errorOf(`${path}.${name}`),
  });
  const known: Known =
    receive.kind === 'stages' ? 'stages' : receive.fromNewestRecord ? 'record' : 'figure';
  return (
    <div className="stack">
      <div className="form__pair">
        <SelectField
          {...field('kind')}
          label="Receiver"
          value={known}
          onChange={(event) => onChange(newChain(event.target.value as Known, newest))}
          note={
            newest || known === 'record' ? undefined : 'Measured noise is entered further down.'
          }
        >
          <option value="figure">System temperature, one figure</option>
          <option value="record" disabled={!newest}>
            System temperature, newest measured
          </option>
          <option value="stages">Stage by stage</option>
        </SelectField>
        {receive.kind === 'stages' ? (
          <FigureField
            {...field('spilloverK')}
            label="Noise from the ground, K (may be empty)"
            value={receive.spilloverK}
            onChange={(spilloverK) => onChange({ ...receive, spilloverK })}
            note="Spillover and what comes through the mesh."
          />
        ) : receive.fromNewestRecord ? (
          <div className="field">
            <span className="field__label">System temperature</span>
            <p className="py-2">
              {newest ? noiseWords(newest) : 'No record of this band is left.'}{' '}
              <span className="quiet">Follows the newest record of this band.</span>
            </p>
          </div>
        ) : (
          <FigureField
            {...field('systemTemperatureK')}
            label="System temperature, K"
            value={receive.systemTemperatureK}
            onChange={(value) => onChange({ ...receive, systemTemperatureK: value ?? NaN })}
            note="On cold sky, away from the Moon and the Sun."
          />
        )}
      </div>
      {receive.kind === 'stages' ? <Chain {...props} receive={receive} /> : null}
    </div>
  );
}

function Chain({
  receive,
  antenna,
  frequencyMhz,
  path,
  errorOf,
  onChange,
}: Props & { receive: Extract<ReceiveChain, { kind: 'stages' }> }) {
  const { stages } = receive;
  const skyK = useMemo(
    () => (antennaSchema.safeParse(antenna).success ? coldSkyK(antenna, frequencyMhz) : null),
    [antenna, frequencyMhz],
  );
  const complete = receiveChainSchema.safeParse(receive).success;
  const report =
    complete && skyK !== null ? chainReport(stages, skyK, receive.spilloverK ?? 0) : null;
  const receiverK = complete ? chainTemperatureK(stages) : null;
  return (
    <>
      <StageList
        {...{ stages, path, errorOf, frequencyMhz, report }}
        onChange={(changed) => onChange({ ...receive, stages: changed })}
      />
      {errorOf(`${path}.stages`) ? (
        <p className="field__error">{errorOf(`${path}.stages`)}</p>
      ) : null}
      {report ? (
        <>
          <ChainPicture stages={stages} report={report} />
          <ChainResult stages={stages} report={report} />
        </>
      ) : (
        <p role="status" className="quiet">
          {receiverK === null
            ? 'Temperatures appear when every stage is complete.'
            : `Receiver ${formatNumber(receiverK, 1)} K, noise figure ${formatNumber(noiseFigureDb(receiverK), 2)} dB. The system temperature appears when the antenna is complete.`}
        </p>
      )}
    </>
  );
}

function newChain(known: Known, newest: NoiseRecord | undefined): ReceiveChain {
  if (known === 'stages') {
    return { kind: 'stages', stages: [newStage('loss'), newStage('amplifier')] };
  }
  if (known === 'figure') return { kind: 'measured', systemTemperatureK: NaN };
  return {
    kind: 'measured',
    systemTemperatureK: newest?.figures.systemTemperatureK ?? NaN,
    fromNewestRecord: true,
  };
}
