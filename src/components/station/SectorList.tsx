import type { BlockedSector } from '../../domain/sky';
import { MAX_BLOCKED_SECTORS } from '../../domain/station/skySchema';
import { Button } from '../ui/Button';
import { TextField } from '../ui/Field';
import { FigureField } from './FigureField';
import { sectorName } from './SkyDomeEditor';
import { fieldId } from './useSave';

interface Props {
  sectors: BlockedSector[];
  selected: number | null;
  drawing: boolean;
  errorOf: (path: string) => string | undefined;
  onSelect: (index: number) => void;
  onSector: (index: number, sector: BlockedSector, step: string) => void;
  onAdd: () => void;
  onDraw: () => void;
  onRemove: (index: number) => void;
}

const FIGURES = [
  ['azimuthFromDeg', 'Azimuth from, °'],
  ['azimuthToDeg', 'Azimuth to, °'],
  ['elevationFromDeg', 'Elevation from, °'],
  ['elevationToDeg', 'Elevation to, °'],
] as const;

/** The blocked sectors in numbers, the same as in the dome. */
export function SectorList(props: Props) {
  const { sectors, selected, drawing, errorOf, onSelect, onSector, onAdd, onDraw, onRemove } =
    props;
  const full = sectors.length >= MAX_BLOCKED_SECTORS;
  return (
    <fieldset className="group ruled stack">
      <legend className="sr-only">Blocked sectors</legend>
      <div className="row justify-between">
        <h2>Blocked sectors</h2>
        <div className="row">
          <Button look="framed" aria-pressed={drawing} onClick={onDraw} disabled={full}>
            {drawing ? 'Stop drawing' : 'Draw in the dome'}
          </Button>
          <Button look="bare" icon="plus" onClick={onAdd} disabled={full}>
            Add by numbers
          </Button>
        </div>
      </div>
      {sectors.length === 0 ? (
        <p className="quiet">
          None yet. A house, a tree, a mast: what stands in the beam, from where to where.
        </p>
      ) : null}
      {sectors.map((sector, index) => (
        <div
          key={index}
          role="group"
          aria-label={sectorName(sector, index)}
          className={`grid grid-cols-2 items-start gap-3 border-l-2 py-2 pl-3 sm:grid-cols-[minmax(7rem,1.5fr)_repeat(4,minmax(0,1fr))_auto] ${selected === index ? 'border-accent' : 'border-rule'}`}
          onFocus={() => onSelect(index)}
        >
          <div className="col-span-2 sm:col-span-1">
            <TextField
              id={fieldId(`sky.blocked.${index}.name`)}
              label="What stands there"
              maxLength={40}
              value={sector.name ?? ''}
              onChange={(event) =>
                onSector(
                  index,
                  { ...sector, name: event.target.value || undefined },
                  `name ${index}`,
                )
              }
              error={errorOf(`sky.blocked.${index}.name`)}
            />
          </div>
          {FIGURES.map(([field, label]) => (
            <FigureField
              key={field}
              id={fieldId(`sky.blocked.${index}.${field}`)}
              label={label}
              value={sector[field]}
              onChange={(value) =>
                onSector(index, { ...sector, [field]: value ?? NaN }, `${field} ${index}`)
              }
              error={errorOf(`sky.blocked.${index}.${field}`)}
            />
          ))}
          <div className="sm:pt-[22px]">
            <Button
              look="bare"
              icon="trash"
              aria-label={`Remove ${sectorName(sector, index)}`}
              onClick={() => onRemove(index)}
            >
              <span className="sm:sr-only">Remove</span>
            </Button>
          </div>
        </div>
      ))}
    </fieldset>
  );
}
