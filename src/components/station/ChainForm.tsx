import { chainTemperatureK, noiseFigureDb, stageSharesK } from '../../domain/link/receiveChain';
import { receiveChainSchema } from '../../domain/station/equipmentSchema';
import { MAX_RECEIVE_STAGES } from '../../domain/station/equipmentSchema';
import type { ReceiveChain, ReceiveStage } from '../../domain/station/setup';
import { formatNumber } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { SelectField } from '../ui/Field';
import { FigureField } from './FigureField';
import { fieldId } from './useSave';

interface Props {
  receive: ReceiveChain;
  path: string;
  errorOf: (path: string) => string | undefined;
  onChange: (receive: ReceiveChain) => void;
}

/** The receiver: one measured figure, or stage by stage from the feed on. */
export function ChainForm({ receive, path, errorOf, onChange }: Props) {
  const field = (name: string) => ({
    id: fieldId(`${path}.${name}`),
    error: errorOf(`${path}.${name}`),
  });
  return (
    <div className="stack">
      <div className="form__pair">
        <SelectField
          {...field('kind')}
          label="Receiver"
          value={receive.kind}
          onChange={(event) => onChange(newChain(event.target.value as ReceiveChain['kind']))}
        >
          <option value="measured">System temperature, measured</option>
          <option value="stages">Stage by stage</option>
        </SelectField>
        {receive.kind === 'measured' ? (
          <FigureField
            {...field('systemTemperatureK')}
            label="System temperature, K"
            value={receive.systemTemperatureK}
            onChange={(value) => onChange({ ...receive, systemTemperatureK: value ?? NaN })}
            note="On cold sky, away from the Moon and the Sun."
          />
        ) : (
          <FigureField
            {...field('spilloverK')}
            label="Noise from the ground, K (may be empty)"
            value={receive.spilloverK}
            onChange={(spilloverK) => onChange({ ...receive, spilloverK })}
            note="Spillover and what comes through the mesh."
          />
        )}
      </div>
      {receive.kind === 'stages' ? (
        <>
          <StageList
            {...{ path, errorOf }}
            stages={receive.stages}
            onChange={(stages) => onChange({ ...receive, stages })}
          />
          {errorOf(`${path}.stages`) ? (
            <p className="field__error">{errorOf(`${path}.stages`)}</p>
          ) : null}
        </>
      ) : null}
    </div>
  );
}

function StageList({
  stages,
  path,
  errorOf,
  onChange,
}: {
  stages: ReceiveStage[];
  path: string;
  errorOf: Props['errorOf'];
  onChange: (stages: ReceiveStage[]) => void;
}) {
  const known = receiveChainSchema.safeParse({ kind: 'stages', stages }).success;
  const shares = known ? stageSharesK(stages) : null;
  const total = known ? chainTemperatureK(stages) : null;
  const set = (index: number, stage: ReceiveStage) =>
    onChange(stages.map((old, at) => (at === index ? stage : old)));
  return (
    <div className="stack">
      <ol className="m-0 list-none p-0">
        {stages.map((stage, index) => {
          const field = (name: string) => ({
            id: fieldId(`${path}.stages.${index}.${name}`),
            error: errorOf(`${path}.stages.${index}.${name}`),
          });
          return (
            <li
              key={index}
              className="grid grid-cols-2 items-start gap-3 border-b border-rule py-3 sm:grid-cols-[9rem_1fr_1fr_5rem_auto]"
            >
              <SelectField
                {...field('kind')}
                label={index === 0 ? 'Stage 1, at the feed' : `Stage ${index + 1}`}
                value={stage.kind}
                onChange={(event) =>
                  set(index, newStage(event.target.value as ReceiveStage['kind']))
                }
              >
                <option value="amplifier">Amplifier</option>
                <option value="loss">Loss</option>
              </SelectField>
              {stage.kind === 'amplifier' ? (
                <>
                  <FigureField
                    {...field('gainDb')}
                    label="Gain, dB"
                    value={stage.gainDb}
                    onChange={(value) => set(index, { ...stage, gainDb: value ?? NaN })}
                  />
                  <FigureField
                    {...field('noiseFigureDb')}
                    label="Noise figure, dB"
                    value={stage.noiseFigureDb}
                    onChange={(value) => set(index, { ...stage, noiseFigureDb: value ?? NaN })}
                  />
                </>
              ) : (
                <>
                  <FigureField
                    {...field('lossDb')}
                    label="Loss, dB"
                    value={stage.lossDb}
                    onChange={(value) => set(index, { ...stage, lossDb: value ?? NaN })}
                  />
                  <FigureField
                    {...field('physicalTemperatureK')}
                    label="Its temperature, K"
                    note="Empty: 290."
                    value={stage.physicalTemperatureK}
                    onChange={(physicalTemperatureK) =>
                      set(index, { ...stage, physicalTemperatureK })
                    }
                  />
                </>
              )}
              <div className="grid gap-1">
                <span className="label">Adds, K</span>
                <span className="py-2">{shares ? formatNumber(shares[index]!, 1) : '–'}</span>
              </div>
              <div className="sm:pt-[22px]">
                <Button
                  look="bare"
                  icon="trash"
                  aria-label={`Remove stage ${index + 1}`}
                  onClick={() => onChange(stages.filter((_, at) => at !== index))}
                >
                  <span className="sm:sr-only">Remove</span>
                </Button>
              </div>
            </li>
          );
        })}
      </ol>
      <div className="row justify-between">
        <div className="row">
          <Button
            look="bare"
            icon="plus"
            disabled={stages.length >= MAX_RECEIVE_STAGES}
            onClick={() => onChange([...stages, newStage('amplifier')])}
          >
            Add an amplifier
          </Button>
          <Button
            look="bare"
            icon="plus"
            disabled={stages.length >= MAX_RECEIVE_STAGES}
            onClick={() => onChange([...stages, newStage('loss')])}
          >
            Add a loss
          </Button>
        </div>
        <p role="status">
          {total === null ? (
            <span className="quiet">The sum appears when every stage is complete.</span>
          ) : (
            <>
              Receiver <strong>{formatNumber(total, 1)} K</strong>, noise figure{' '}
              {formatNumber(noiseFigureDb(total), 2)} dB
            </>
          )}
        </p>
      </div>
    </div>
  );
}

function newStage(kind: ReceiveStage['kind']): ReceiveStage {
  return kind === 'amplifier' ? { kind, gainDb: NaN, noiseFigureDb: NaN } : { kind, lossDb: NaN };
}

function newChain(kind: ReceiveChain['kind']): ReceiveChain {
  return kind === 'measured'
    ? { kind, systemTemperatureK: NaN }
    : { kind, stages: [newStage('loss'), newStage('amplifier')] };
}
