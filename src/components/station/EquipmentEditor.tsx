import { useState } from 'react';
import { usualPolarization } from '../../domain/guest/guest';
import { BANDS, bandById, type BandId } from '../../domain/station/bands';
import { equipmentUpdateSchema } from '../../domain/station/schema';
import { newestRecord, type NoiseRecord } from '../../domain/station/noiseRecord';
import type { BandSetup } from '../../domain/station/setup';
import type { BandEquipment } from '../../domain/station/views';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { SelectField } from '../ui/Field';
import { IslandForm } from '../ui/IslandForm';
import { Cautions, ProblemSummary } from '../ui/Notices';
import { BandForm } from './BandForm';
import { SaveBar } from './SaveBar';
import { useEditor } from './useEditor';

export interface EquipmentStation {
  id: string;
  version: number;
  equipment: BandEquipment[];
  transmitElevationFromDeg?: number | undefined;
}

interface Props {
  station: EquipmentStation;
  /** Measured noise, newest first. */
  records: NoiseRecord[];
  next?: string | undefined;
  onSaved: (equipment: BandEquipment[]) => void;
}

/** Equipment band by band. */
export function EquipmentEditor({ station, records, next, onSaved }: Props) {
  const [bands, setBands] = useState(station.equipment);
  const editor = useEditor({
    url: paths.api.stationEquipment(station.id),
    schema: equipmentUpdateSchema,
    version: station.version,
    next,
    onSaved: () => onSaved(bands),
  });
  const change = (changed: BandEquipment[]) => {
    setBands(changed);
    editor.touch();
  };
  const free = BANDS.filter((band) => !bands.some((used) => used.band === band.id));
  const [chosen, setChosen] = useState<BandId | ''>('');
  const toAdd =
    free.find((band) => band.id === chosen) ?? free.find((band) => band.id === '1296') ?? free[0];

  const add = (band: BandId) => {
    const like = bands.at(-1)?.setup;
    change(
      [...bands, { band, setup: newSetup(band, like) }].sort(
        (a, b) => bandById(a.band).centreMhz - bandById(b.band).centreMhz,
      ),
    );
    setChosen('');
  };

  return (
    <IslandForm
      noValidate
      className="columns columns--margin"
      onSubmit={(event) => {
        event.preventDefault();
        void editor.submit({ equipment: bands });
      }}
    >
      <div className="stack stack--wide">
        <ProblemSummary problems={editor.problems} />
        {bands.length === 0 ? (
          <p>No band yet. Add the first one; margins are computed from what you enter here.</p>
        ) : null}
        {bands.map(({ band, setup }, index) => (
          <BandForm
            key={band}
            band={band}
            setup={setup}
            newest={newestRecord(records, band)}
            path={`equipment.${index}.setup`}
            errorOf={editor.errorOf}
            onChange={(changed) =>
              change(bands.map((old, at) => (at === index ? { band, setup: changed } : old)))
            }
            onRemove={() => change(bands.filter((_, at) => at !== index))}
          />
        ))}
        {toAdd ? (
          <div className="row ruled items-end">
            <div className="w-40">
              <SelectField
                id="band-to-add"
                label="Another band"
                value={toAdd.id}
                onChange={(event) => setChosen(event.target.value as BandId)}
              >
                {free.map((band) => (
                  <option key={band.id} value={band.id}>
                    {band.label}
                  </option>
                ))}
              </SelectField>
            </div>
            <Button icon="plus" onClick={() => add(toAdd.id)}>
              Add {toAdd.label}
            </Button>
          </div>
        ) : null}
        <SaveBar
          editor={editor}
          label={next ? 'Save and finish' : 'Save the equipment'}
          done="The equipment is saved. New searches use it."
        />
      </div>
      <div className="stack">
        <Cautions lowestElevationDeg={station.transmitElevationFromDeg} />
        <p className="label">
          Power is counted at the feed, after cable and relay. Dishes: gain from diameter and
          efficiency, beamwidth 70 λ/D. The receiver’s noise is summed from the feed on by Friis’s
          formula; sky, Moon, Sun and atmosphere are added for each moment.
        </p>
      </div>
    </IslandForm>
  );
}

/** Empty where only the keeper knows; the dish of another band is most often the same one. */
function newSetup(band: BandId, like: BandSetup | undefined): BandSetup {
  const dish = like?.antenna.kind === 'dish' ? like.antenna.diameterM : NaN;
  return {
    antenna: { kind: 'dish', diameterM: dish, apertureEfficiency: 0.55 },
    polarization: usualPolarization(bandById(band).centreMhz),
    powerAtFeedW: NaN,
    receive: { kind: 'measured', systemTemperatureK: NaN },
  };
}
