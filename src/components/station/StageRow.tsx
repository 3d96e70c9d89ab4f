import type { NoiseShare } from '../../domain/link/chainReport';
import type { ReceiveStage } from '../../domain/station/setup';
import { formatNumber } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { SelectField, TextField } from '../ui/Field';
import { FigureField } from './FigureField';
import { fieldId } from './useSave';

interface Props {
  stage: ReceiveStage;
  index: number;
  last: boolean;
  path: string;
  errorOf: (path: string) => string | undefined;
  /** Of the system temperature; null while it is not known. */
  share: NoiseShare | null;
  onChange: (stage: ReceiveStage) => void;
  onMove: (by: -1 | 1) => void;
  onRemove: () => void;
}

/** Id of a control of a stage; '' gives what all of them begin with. */
export function stageFieldId(path: string, index: number, name: string): string {
  return fieldId(`${path}.stages.${index}.${name}`);
}

/** One stage of the chain. Alt with the up or down arrow moves it from any of its fields. */
export function StageRow(props: Props) {
  const { stage, index, last, path, errorOf, share, onChange, onMove, onRemove } = props;
  const field = (name: string) => ({
    id: stageFieldId(path, index, name),
    error: errorOf(`${path}.stages.${index}.${name}`),
  });
  return (
    // The keys are those of the fields inside; the row itself takes no focus.
    // eslint-disable-next-line jsx-a11y/no-noninteractive-element-interactions
    <li
      className="grid grid-cols-2 items-start gap-3 border-b border-rule py-3 sm:grid-cols-4 xl:grid-cols-[minmax(0,1.3fr)_8rem_minmax(0,1fr)_minmax(0,1fr)_4.5rem_auto]"
      onKeyDown={(event) => {
        if (!event.altKey || (event.key !== 'ArrowUp' && event.key !== 'ArrowDown')) return;
        event.preventDefault();
        onMove(event.key === 'ArrowUp' ? -1 : 1);
      }}
    >
      <div className="sm:col-span-2 xl:col-span-1">
        <TextField
          {...field('name')}
          label={`Stage ${index + 1}${index === 0 ? ', at the feed' : ''}`}
          placeholder="its name"
          maxLength={30}
          autoComplete="off"
          value={stage.name ?? ''}
          onChange={({ target: { value } }) =>
            onChange({ ...stage, name: value === '' ? undefined : value })
          }
        />
      </div>
      <div className="sm:col-span-2 xl:col-span-1">
        <SelectField
          {...field('kind')}
          label="Is"
          value={stage.kind}
          onChange={(event) => onChange(asKind(stage, event.target.value as ReceiveStage['kind']))}
        >
          <option value="amplifier">Amplifier</option>
          <option value="loss">Loss</option>
        </SelectField>
      </div>
      {stage.kind === 'amplifier' ? (
        <>
          <FigureField
            {...field('gainDb')}
            label="Gain, dB"
            value={stage.gainDb}
            onChange={(value) => onChange({ ...stage, gainDb: value ?? NaN })}
          />
          <FigureField
            {...field('noiseFigureDb')}
            label="Noise figure, dB"
            value={stage.noiseFigureDb}
            onChange={(value) => onChange({ ...stage, noiseFigureDb: value ?? NaN })}
          />
        </>
      ) : (
        <>
          <FigureField
            {...field('lossDb')}
            label="Loss, dB"
            value={stage.lossDb}
            onChange={(value) => onChange({ ...stage, lossDb: value ?? NaN })}
          />
          <FigureField
            {...field('physicalTemperatureK')}
            label="Its warmth, K (290)"
            value={stage.physicalTemperatureK}
            onChange={(physicalTemperatureK) => onChange({ ...stage, physicalTemperatureK })}
          />
        </>
      )}
      <div className="grid gap-1">
        <span className="label">Adds</span>
        <span className="leading-5">
          {share ? (
            <>
              <strong>{formatNumber(share.kelvin, 1)}&nbsp;K</strong>
              <br />
              <span className="label">{formatNumber(share.share * 100)} %</span>
            </>
          ) : (
            '–'
          )}
        </span>
      </div>
      <div className="flex justify-end gap-1 self-center xl:pt-4">
        <Button
          look="bare"
          icon="arrowUp"
          id={field('up').id}
          aria-label={`Move stage ${index + 1} towards the feed`}
          aria-disabled={index === 0}
          className="stage__tool"
          onClick={() => onMove(-1)}
        >
          {''}
        </Button>
        <Button
          look="bare"
          icon="arrowDown"
          id={field('down').id}
          aria-label={`Move stage ${index + 1} away from the feed`}
          aria-disabled={last}
          className="stage__tool"
          onClick={() => onMove(1)}
        >
          {''}
        </Button>
        <Button
          look="bare"
          icon="trash"
          id={field('remove').id}
          aria-label={`Remove stage ${index + 1}`}
          className="stage__tool"
          onClick={onRemove}
        >
          {''}
        </Button>
      </div>
    </li>
  );
}

function asKind(stage: ReceiveStage, kind: ReceiveStage['kind']): ReceiveStage {
  if (stage.kind === kind) return stage;
  const { name } = stage;
  return kind === 'amplifier'
    ? { kind, name, gainDb: NaN, noiseFigureDb: NaN }
    : { kind, name, lossDb: NaN };
}
