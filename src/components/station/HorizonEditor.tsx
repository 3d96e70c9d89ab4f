import { useState, type ChangeEvent } from 'react';
import type { HorizonPoint } from '../../domain/sky';
import {
  MAX_HORIZON_CSV_BYTES,
  parseHorizonCsv,
  type CsvProblem,
} from '../../domain/station/horizonCsv';
import { MAX_HORIZON_POINTS } from '../../domain/station/skySchema';
import { formatAngle } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { Icon } from '../ui/Icon';
import { FigureField } from './FigureField';
import { fieldId } from './useSave';

interface Props {
  points: HorizonPoint[];
  preview: HorizonPoint[] | undefined;
  errorOf: (path: string) => string | undefined;
  onPreview: (points: HorizonPoint[] | undefined) => void;
  onPoints: (points: HorizonPoint[], step: string) => void;
}

/** More points than this are not listed as fields. */
const LISTED = 72;

/** The horizon profile: from a file, looked at before it is taken, or point by point. */
export function HorizonEditor({ points, preview, errorOf, onPreview, onPoints }: Props) {
  const [problems, setProblems] = useState<CsvProblem[]>([]);
  const [fileName, setFileName] = useState('');

  const read = async (event: ChangeEvent<HTMLInputElement>) => {
    const input = event.target;
    const file = input.files?.[0];
    if (!file) return;
    setFileName(file.name);
    const tooLarge = file.size > MAX_HORIZON_CSV_BYTES;
    const found = tooLarge
      ? { points: [], problems: [{ line: 0, message: 'The file is larger than 100 kB.' }] }
      : parseHorizonCsv(await file.text());
    setProblems(found.problems);
    onPreview(found.problems.length === 0 ? found.points : undefined);
    // So that the same file, corrected, can be chosen again.
    input.value = '';
  };

  return (
    <fieldset className="group ruled stack">
      <legend className="sr-only">Horizon profile</legend>
      <div className="row justify-between">
        <h2>Horizon profile</h2>
        <div className="row">
          <label className="button button--framed has-focus-visible:outline-2">
            <Icon name="upload" />
            Choose a CSV file
            <input
              className="sr-only"
              type="file"
              accept=".csv,.txt,text/csv,text/plain"
              aria-describedby="horizon-note"
              onChange={(event) => void read(event)}
            />
          </label>
          <Button
            look="bare"
            icon="plus"
            disabled={points.length >= MAX_HORIZON_POINTS}
            onClick={() =>
              onPoints([...points, { azimuthDeg: NaN, elevationDeg: NaN }], `add ${points.length}`)
            }
          >
            Add a point
          </Button>
        </div>
      </div>
      <p className="label" id="horizon-note">
        Two columns, azimuth and elevation in degrees; between points the profile is straight.
      </p>
      {problems.length > 0 ? (
        <div className="notice notice--problem" role="alert">
          <h3>{fileName} was not taken</h3>
          <ul>
            {problems.map(({ message }) => (
              <li key={message}>{message}</li>
            ))}
          </ul>
        </div>
      ) : null}
      {preview ? (
        <div className="notice stack" role="status">
          <p>
            {fileName}: {preview.length} {preview.length === 1 ? 'point' : 'points'}, highest{' '}
            {formatAngle(Math.max(...preview.map((point) => point.elevationDeg)))}. The accent line
            in the dome shows it.
          </p>
          <div className="row">
            <Button
              look="framed"
              onClick={() => {
                onPoints(preview, 'file');
                onPreview(undefined);
              }}
            >
              Take this profile
            </Button>
            <Button look="bare" onClick={() => onPreview(undefined)}>
              Leave it
            </Button>
          </div>
        </div>
      ) : null}
      {points.length === 0 ? (
        <p className="quiet">None: the horizon is flat at 0°.</p>
      ) : (
        <div className="row justify-between">
          <p>
            {points.length} {points.length === 1 ? 'point' : 'points'}
            {points.every((point) => Number.isFinite(point.elevationDeg))
              ? `, highest ${formatAngle(Math.max(...points.map((point) => point.elevationDeg)))}`
              : ''}
            .
          </p>
          <Button look="bare" icon="trash" onClick={() => onPoints([], 'none')}>
            Remove the profile
          </Button>
        </div>
      )}
      {points.length > 0 && points.length <= LISTED ? (
        <PointFields points={points} errorOf={errorOf} onPoints={onPoints} />
      ) : null}
    </fieldset>
  );
}

function PointFields({
  points,
  errorOf,
  onPoints,
}: Pick<Props, 'points' | 'errorOf' | 'onPoints'>) {
  const failed = points.some(
    (_, index) =>
      errorOf(`sky.horizon.${index}.azimuthDeg`) ?? errorOf(`sky.horizon.${index}.elevationDeg`),
  );
  const unfinished = points.some((point) => !Number.isFinite(point.azimuthDeg));
  const change = (index: number, part: Partial<HorizonPoint>) =>
    onPoints(
      points.map((point, at) => (at === index ? { ...point, ...part } : point)),
      `point ${index}`,
    );
  return (
    <details open={failed || unfinished || undefined}>
      <summary>Points in numbers</summary>
      <div className="stack pt-3">
        {points.map((point, index) => (
          <div
            key={index}
            role="group"
            aria-label={`Point ${index + 1}`}
            className="grid grid-cols-[1fr_1fr_auto] items-start gap-3"
          >
            <FigureField
              id={fieldId(`sky.horizon.${index}.azimuthDeg`)}
              label="Azimuth, °"
              value={point.azimuthDeg}
              onChange={(azimuthDeg) => change(index, { azimuthDeg: azimuthDeg ?? NaN })}
              error={errorOf(`sky.horizon.${index}.azimuthDeg`)}
            />
            <FigureField
              id={fieldId(`sky.horizon.${index}.elevationDeg`)}
              label="Elevation, °"
              value={point.elevationDeg}
              onChange={(elevationDeg) => change(index, { elevationDeg: elevationDeg ?? NaN })}
              error={errorOf(`sky.horizon.${index}.elevationDeg`)}
            />
            <div className="pt-[22px]">
              <Button
                look="bare"
                icon="trash"
                aria-label={`Remove point ${index + 1}`}
                onClick={() =>
                  onPoints(
                    points.filter((_, at) => at !== index),
                    `remove ${index}`,
                  )
                }
              >
                <span className="sr-only">Remove</span>
              </Button>
            </div>
          </div>
        ))}
      </div>
    </details>
  );
}
