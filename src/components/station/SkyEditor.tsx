import { useState } from 'react';
import type { BlockedSector, HorizonPoint, SkyLimits } from '../../domain/sky';
import { skyUpdateSchema } from '../../domain/station/schema';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { IslandForm } from '../ui/IslandForm';
import { Cautions, ProblemSummary } from '../ui/Notices';
import { HorizonEditor } from './HorizonEditor';
import { SaveBar } from './SaveBar';
import { SectorList } from './SectorList';
import { SkyDomeEditor } from './SkyDomeEditor';
import { SkyRanges } from './SkyRanges';
import type { TrackPoint } from './skyTrack';
import { useEditor } from './useEditor';
import { useUndo } from './useUndo';

interface Props {
  station: { id: string; version: number; sky: SkyLimits };
  track: TrackPoint[];
  next?: string | undefined;
}

/** What the dish can see: the dome to draw in, and the same in numbers beside it. */
export function SkyEditor({ station, track, next }: Props) {
  const sky = useUndo<SkyLimits>(station.sky);
  const [selected, setSelected] = useState<number | null>(null);
  const [drawing, setDrawing] = useState(false);
  const [preview, setPreview] = useState<HorizonPoint[] | undefined>();
  const editor = useEditor({
    url: paths.api.stationSky(station.id),
    schema: skyUpdateSchema,
    version: station.version,
    next,
  });
  const sectors = sky.value.blocked ?? [];
  const change = (part: Partial<SkyLimits>, step: string) => {
    sky.change({ ...sky.value, ...part }, step);
    editor.touch();
  };
  const setSector = (index: number, sector: BlockedSector, step: string) =>
    change({ blocked: sectors.map((old, at) => (at === index ? sector : old)) }, step);
  const addSector = (sector: BlockedSector) => {
    change({ blocked: [...sectors, sector] }, `add ${sectors.length}`);
    sky.rest();
    setSelected(sectors.length);
    setDrawing(false);
  };
  const removeSector = (index: number) => {
    change({ blocked: sectors.filter((_, at) => at !== index) }, `remove ${index}`);
    sky.rest();
    setSelected(null);
  };
  const undo = () => {
    sky.undo();
    setSelected(null);
    editor.touch();
  };

  return (
    <IslandForm
      noValidate
      className="stack"
      onSubmit={(event) => {
        event.preventDefault();
        const ready = readySky(sky.value);
        sky.change(ready, 'save');
        sky.rest();
        void editor.submit({ sky: ready });
      }}
    >
      <ProblemSummary problems={editor.problems} />
      <div className="columns columns--detail">
        <div className="stack lg:order-2">
          <div className="stack lg:sticky lg:top-4">
            <SkyDomeEditor
              sky={sky.value}
              selected={selected}
              drawing={drawing}
              track={track}
              preview={preview}
              onSelect={setSelected}
              onSector={setSector}
              onDraw={addSector}
              onRemove={removeSector}
              onRest={sky.rest}
            />
            <p className="label text-center" role="status">
              {drawing
                ? 'Pull over the part of the sky that is blocked, from corner to corner.'
                : 'Dotted: the Moon’s path in the next 24 hours, numbered in hours UTC. Press a sector to move or resize it; arrow keys move by 1°, with Shift by 5°.'}
            </p>
            <div className="row justify-center">
              <Button look="bare" icon="undo" onClick={undo} disabled={!sky.canUndo}>
                Undo
              </Button>
            </div>
          </div>
        </div>
        <div className="stack stack--wide lg:order-1">
          <SkyRanges sky={sky.value} errorOf={editor.errorOf} onChange={change} />
          <Cautions lowestElevationDeg={finite(sky.value.transmitElevationFromDeg)} />
          <SectorList
            sectors={sectors}
            selected={selected}
            drawing={drawing}
            errorOf={editor.errorOf}
            onSelect={setSelected}
            onSector={setSector}
            onDraw={() => setDrawing(!drawing)}
            onAdd={() =>
              addSector({
                azimuthFromDeg: 80,
                azimuthToDeg: 100,
                elevationFromDeg: 0,
                elevationToDeg: 15,
              })
            }
            onRemove={removeSector}
          />
          <HorizonEditor
            points={sky.value.horizon ?? []}
            preview={preview}
            errorOf={editor.errorOf}
            onPreview={setPreview}
            onPoints={(horizon, step) => change({ horizon }, step)}
          />
        </div>
      </div>
      <SaveBar
        editor={editor}
        label={next ? 'Save and go on to the equipment' : 'Save the sky'}
        done="The sky is saved. New searches use it."
      />
    </IslandForm>
  );
}

function finite(value: number | undefined): number | undefined {
  return value !== undefined && Number.isFinite(value) ? value : undefined;
}

/**
 * As it is saved: empty lists left out, points by azimuth with 360 as 0. A sky without any limit says so by
 * a lowest elevation of 0, which is what limits then, so that it is not taken for one never described.
 */
function readySky(sky: SkyLimits): SkyLimits {
  const horizon = sky.horizon
    ?.map((point) => (point.azimuthDeg === 360 ? { ...point, azimuthDeg: 0 } : point))
    .sort((a, b) => a.azimuthDeg - b.azimuthDeg);
  const given = Object.entries({ ...sky, horizon }).filter(
    ([, value]) => value !== undefined && !(Array.isArray(value) && value.length === 0),
  );
  return given.length === 0 ? { elevationFromDeg: 0 } : Object.fromEntries(given);
}
