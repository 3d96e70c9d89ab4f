import { useEffect, useRef, useState } from 'react';
import type { ChainReport } from '../../domain/link/chainReport';
import { stageName } from '../../domain/link/chainHints';
import { chainPresets } from '../../domain/station/chainPresets';
import { MAX_RECEIVE_STAGES } from '../../domain/station/equipmentSchema';
import type { ReceiveStage } from '../../domain/station/setup';
import { Button } from '../ui/Button';
import { SelectField } from '../ui/Field';
import { StageRow, stageFieldId } from './StageRow';

interface Props {
  stages: ReceiveStage[];
  path: string;
  errorOf: (path: string) => string | undefined;
  frequencyMhz: number;
  /** Null while a figure is missing. */
  report: ChainReport | null;
  onChange: (stages: ReceiveStage[]) => void;
}

/** Stages in order, feed first: add, remove, move with the buttons or Alt and an arrow key. */
export function StageList({ stages, path, errorOf, frequencyMhz, report, onChange }: Props) {
  const { keys, rearrange } = useKeys(stages.length);
  const [said, setSaid] = useState('');
  const wanted = useRef<string | null>(null);
  const presets = chainPresets(frequencyMhz);

  // Moving a row in the page takes the focus from it.
  useEffect(() => {
    if (wanted.current) document.getElementById(wanted.current)?.focus();
    wanted.current = null;
  });

  const change = (order: number[], added: ReceiveStage[] = []) => {
    rearrange(order, added.length);
    onChange([...order.map((index) => stages[index]!), ...added]);
  };
  const move = (index: number, by: -1 | 1) => {
    const to = index + by;
    if (to < 0 || to >= stages.length) return;
    const order = stages.map((_, at) => (at === index ? to : at === to ? index : at));
    const focused = document.activeElement?.id ?? '';
    const prefix = stageFieldId(path, index, '');
    if (focused.startsWith(prefix)) {
      wanted.current = stageFieldId(path, to, focused.slice(prefix.length));
    }
    change(order);
    setSaid(`${stageName(stages, index)} is now stage ${to + 1} of ${stages.length}.`);
  };
  const remove = (index: number) => {
    const left = stages.length - 1;
    wanted.current =
      left > 0 ? stageFieldId(path, Math.min(index, left - 1), 'remove') : `${path}-add-amplifier`;
    change(stages.flatMap((_, at) => (at === index ? [] : [at])));
    setSaid(`Stage ${index + 1} is removed. ${left} left.`);
  };
  const add = (kind: ReceiveStage['kind']) => {
    wanted.current = stageFieldId(path, stages.length, 'name');
    change(
      stages.map((_, index) => index),
      [newStage(kind)],
    );
    setSaid(`Stage ${stages.length + 1} is added at the end.`);
  };
  const full = stages.length >= MAX_RECEIVE_STAGES;

  return (
    <div className="stack">
      <ol className="m-0 list-none border-t border-rule p-0">
        {stages.map((stage, index) => (
          <StageRow
            key={keys[index] ?? index}
            {...{ stage, index, path, errorOf }}
            last={index === stages.length - 1}
            share={report?.stages[index] ?? null}
            onChange={(changed) =>
              onChange(stages.map((old, at) => (at === index ? changed : old)))
            }
            onMove={(by) => move(index, by)}
            onRemove={() => remove(index)}
          />
        ))}
      </ol>
      <div className="row items-start! justify-between">
        <div className="row sm:max-w-100">
          <Button
            look="bare"
            icon="plus"
            id={`${path}-add-amplifier`}
            disabled={full}
            onClick={() => add('amplifier')}
          >
            Add an amplifier
          </Button>
          <Button look="bare" icon="plus" disabled={full} onClick={() => add('loss')}>
            Add a loss
          </Button>
          <p className="label max-sm:hidden">Alt with an arrow key moves the stage you are in.</p>
        </div>
        <div className="w-full sm:w-80">
          <SelectField
            id={`${path}-preset`}
            label="Begin with a usual chain"
            value=""
            note="Round figures of common practice. They replace the stages above; put your own in."
            onChange={(event) => {
              const preset = presets[Number(event.target.value)];
              if (!preset) return;
              rearrange([], preset.stages.length);
              onChange(preset.stages);
              setSaid(`${preset.label}: ${preset.stages.length} stages.`);
            }}
          >
            <option value="">Choose</option>
            {presets.map((preset, index) => (
              <option key={preset.label} value={index}>
                {preset.label}
              </option>
            ))}
          </SelectField>
        </div>
      </div>
      <p className="sr-only" role="status">
        {said}
      </p>
    </div>
  );
}

/** Keys that stay with a stage when it moves, so that what was typed moves along. */
function useKeys(count: number) {
  const [kept, setKept] = useState(() => ({
    next: count,
    keys: Array.from({ length: count }, (_, index) => index),
  }));
  return {
    keys: kept.keys,
    rearrange: (order: number[], added: number): void => {
      setKept(({ keys, next }) => ({
        next: next + added,
        keys: [
          ...order.map((index) => keys[index]!),
          ...Array.from({ length: added }, (_, index) => next + index),
        ],
      }));
    },
  };
}

export function newStage(kind: ReceiveStage['kind']): ReceiveStage {
  return kind === 'amplifier' ? { kind, gainDb: NaN, noiseFigureDb: NaN } : { kind, lossDb: NaN };
}
