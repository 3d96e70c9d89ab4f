import { useState } from 'react';
import { antennaFigures } from '../../domain/link/antenna';
import {
  exposureEstimate,
  type ExposureEstimate as Estimate,
} from '../../domain/link/exposureEstimate';
import {
  distanceWords,
  GROUND_BELOW_MHZ,
  GROUND_FACTOR,
  LEVEL_WORDS,
  metresWords as metres,
} from '../../domain/link/exposureWords';
import { bandById, type BandId } from '../../domain/station/bands';
import { antennaSchema } from '../../domain/station/equipmentSchema';
import type { Antenna } from '../../domain/station/setup';
import { formatNumber } from '../../domain/time/format';
import { CheckField } from '../ui/Field';
import { FigureField } from './FigureField';

interface Props {
  band: BandId;
  antenna: Antenna;
  powerAtFeedW: number;
}

/** Turn about, of any stretch the limits are averaged over. */
const USUAL_DUTY_PERCENT = 50;
/** How far the beam exceeds the usual exposure levels: an estimate, said so, with what it leaves out. */
export function ExposureEstimate({ band, antenna, powerAtFeedW }: Props) {
  const { label, centreMhz } = bandById(band);
  const [dutyPercent, setDutyPercent] = useState<number | undefined>(USUAL_DUTY_PERCENT);
  const [ground, setGround] = useState(centreMhz < GROUND_BELOW_MHZ);
  const dutyKnown = dutyPercent !== undefined && dutyPercent > 0 && dutyPercent <= 100;
  const known = antennaSchema.safeParse(antenna).success && powerAtFeedW > 0 && powerAtFeedW <= 1e6;
  const estimate =
    known && dutyKnown
      ? exposureEstimate({
          frequencyMhz: centreMhz,
          powerW: powerAtFeedW,
          gainDbi: antennaFigures(antenna, centreMhz).gainDbi,
          ...(antenna.kind === 'dish' ? { diameterM: antenna.diameterM } : {}),
          duty: dutyPercent / 100,
          groundFactor: ground ? GROUND_FACTOR : 1,
        })
      : null;
  return (
    <div className="stack" id={`exposure-${band}`}>
      <h3 className="font-semibold">People in the beam on {label}: an estimate</h3>
      <div className="form__pair items-end">
        <FigureField
          id={`exposure-${band}-duty`}
          label="Transmitting, % of the time"
          value={dutyPercent}
          onChange={setDutyPercent}
          note="Of any 6 minutes. 50 when you take turns, 100 for a carrier while you tune."
          error={
            dutyKnown ? undefined : 'The time transmitting must be more than 0 and at most 100 %.'
          }
        />
        <CheckField
          id={`exposure-${band}-ground`}
          label="Count a reflection from the ground"
          note="2.56 times the density; usual for a beam low over ground."
          checked={ground}
          onChange={(event) => setGround(event.target.checked)}
        />
      </div>
      {estimate ? (
        <Distances estimate={estimate} />
      ) : (
        <p className="quiet">Distances appear when antenna and power are complete.</p>
      )}
      <p className="label">
        Estimated by the {antenna.kind === 'dish' ? 'aperture and far-field' : 'far-field'} formulas
        of FCC OET Bulletin 65 against 47 CFR 1.1310 and ICNIRP 2020. Sidelobes, spillover, leaks
        and other transmitters are not in it. It is no survey of your site: your national rules, the
        evaluation they ask for and licensed practice come first.
      </p>
    </div>
  );
}

function Distances({ estimate: { levels, dish } }: { estimate: Estimate }) {
  return (
    <>
      <table className="table--cards table">
        <thead>
          <tr>
            <th scope="col">Level for</th>
            <th scope="col" className="figure">
              W/m²
            </th>
            <th scope="col" className="figure">
              Averaged over, min
            </th>
            <th scope="col" className="figure">
              Exceeded in the beam out to
            </th>
          </tr>
        </thead>
        <tbody>
          {levels.map((level) => (
            <tr key={level.id}>
              <th scope="row" data-label="Level for">
                {LEVEL_WORDS[level.id]}
              </th>
              <td data-label="W/m²" className="figure">
                {formatNumber(level.limitWm2, 1)}
              </td>
              <td data-label="Averaged over, min" className="figure">
                {level.averagedOverMin}
              </td>
              <td data-label="Exceeded out to" className="figure">
                <strong>{distanceWords(level)}</strong>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {dish ? (
        <p>
          Right at the dish up to {density(dish.surfaceWm2)} W/m². In the near field, out to{' '}
          {metres(dish.nearEndM)}, {density(dish.nearWm2)} W/m² by OET-65; another published figure
          for the peak on the axis is higher, {density(dish.peakWm2)} W/m². Far field from{' '}
          {metres(dish.farStartM)} on. Between feed and dish it is far more: nobody belongs there
          while you transmit.
        </p>
      ) : (
        <p>
          Counted as far field at every distance, which reads too high close to the antenna. Nobody
          belongs near the elements while you transmit: they burn at a touch.
        </p>
      )}
    </>
  );
}

function density(wm2: number): string {
  return formatNumber(wm2, wm2 < 10 ? 1 : 0);
}
