import { geoCircle, geoGraticule, geoNaturalEarth1, geoPath } from 'd3-geo';
import type { FeatureCollection } from 'geojson';
import { useEffect, useMemo, useState } from 'react';
import type { PlanView } from '../../domain/activity/planView';
import { moonFootprint, moonSampleDirect } from '../../domain/ephemeris';
import { formatPosition, formatUtc } from '../../domain/time/format';
import { MINUTE_MS, type Interval } from '../../domain/time/interval';
import { loadedLand, loadLand } from '../chart/land';

interface Props {
  span: Interval;
  plan: Pick<PlanView, 'stations' | 'slots'>;
}

const WIDTH = 900;
const HEIGHT = 440;
const STEP_MS = 15 * MINUTE_MS;

const projection = geoNaturalEarth1().fitSize([WIDTH, HEIGHT], { type: 'Sphere' }).precision(0.3);
const path = geoPath(projection).digits(1);

/** The stations of a plan on the world, and the half of it that sees the Moon at an hour to be chosen. */
export function PlanMap({ span, plan }: Props) {
  const [coast, setCoast] = useState<FeatureCollection | null>(loadedLand);
  const steps = Math.floor((span.endMs - span.startMs) / STEP_MS);
  const [step, setStep] = useState(() => firstStep(span, plan.slots));
  // Drawn in the browser only: two machines need not agree on the last digit of a projection.
  const [here, setHere] = useState(false);
  useEffect(() => setHere(true), []);
  useEffect(() => {
    let stays = true;
    loadLand().then(
      (loaded) => stays && setCoast(loaded),
      () => undefined,
    );
    return () => {
      stays = false;
    };
  }, []);

  const atMs = span.startMs + step * STEP_MS;
  const footprint = useMemo(() => moonFootprint(atMs), [atMs]);
  const seen = useMemo(
    () =>
      plan.stations.map(
        ({ latitudeDeg, longitudeDeg }) =>
          moonSampleDirect({ latitudeDeg, longitudeDeg, heightM: 0 }, atMs).elevationDeg > 0,
      ),
    [plan.stations, atMs],
  );
  const active = plan.slots.filter(
    ({ startMs, endMs, state }) => startMs <= atMs && atMs < endMs && state !== 'givenBack',
  );
  const lit = geoCircle()
    .center([footprint.longitudeDeg, footprint.latitudeDeg])
    .radius(footprint.radiusDeg)
    .precision(2)();
  const point = (index: number) => {
    const { longitudeDeg, latitudeDeg } = plan.stations[index]!;
    return projection([longitudeDeg, latitudeDeg]) ?? [0, 0];
  };
  const overhead = projection([footprint.longitudeDeg, footprint.latitudeDeg]) ?? [0, 0];
  const count = seen.filter(Boolean).length;
  const sentence = `${formatUtc(atMs)}: the Moon is overhead at ${formatPosition(footprint, 0)} and above the horizon of ${count} of ${plan.stations.length} stations. ${active.length === 0 ? 'No slot then.' : `${active.length} ${active.length === 1 ? 'slot' : 'slots'} then: ${active.map(({ first, second }) => `${plan.stations[first]!.callSign} with ${plan.stations[second]!.callSign}`).join(', ')}.`}`;
  if (!here) {
    return (
      <figure className="m-0 grid gap-2">
        <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} className="chart map" aria-hidden="true" />
        <figcaption>{sentence}</figcaption>
      </figure>
    );
  }
  return (
    <figure className="m-0 grid gap-2">
      <svg
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        className="chart map"
        role="img"
        aria-label={sentence}
      >
        <path className="map__sea" d={path({ type: 'Sphere' }) ?? ''} />
        {coast ? <path className="map__land" d={path(coast) ?? ''} /> : null}
        <path className="map__grid" d={path(geoGraticule().step([30, 30])()) ?? ''} />
        <path className="map__lit" d={path(lit) ?? ''} />
        {active.map(({ first, second, skedId }) => (
          <path
            key={skedId}
            className="map__pair"
            d={
              path({
                type: 'LineString',
                coordinates: [first, second].map((index) => [
                  plan.stations[index]!.longitudeDeg,
                  plan.stations[index]!.latitudeDeg,
                ]),
              }) ?? ''
            }
          />
        ))}
        <circle className="map__moon" cx={overhead[0]} cy={overhead[1]} r={7} />
        {plan.stations.map((station, index) => {
          const [x, y] = point(index);
          return (
            <g
              key={station.id}
              className={seen[index] ? 'map__station' : 'map__station map__station--down'}
            >
              <circle cx={x} cy={y} r={4} />
              <text x={x + 6} y={y + 4}>
                {station.place}
              </text>
            </g>
          );
        })}
      </svg>
      <label className="grid gap-1" htmlFor="map-hour">
        <span className="label">Hour, UTC</span>
        <input
          id="map-hour"
          type="range"
          min={0}
          max={steps}
          value={step}
          aria-valuetext={formatUtc(atMs)}
          onChange={(event) => setStep(Number(event.target.value))}
        />
      </label>
      <figcaption aria-live="polite">{sentence}</figcaption>
      <p className="label">
        Inside the outline the Moon is up. Numbers are those of the roster; positions only as exact
        as each station shows them. {coast ? '' : 'Loading coastlines.'}
      </p>
    </figure>
  );
}

/** The hour of the first slot, else the middle of the activity. */
function firstStep(span: Interval, slots: readonly Interval[]): number {
  const firstMs = Math.min(...slots.map(({ startMs }) => startMs));
  const atMs = Number.isFinite(firstMs) ? firstMs : (span.startMs + span.endMs) / 2;
  return Math.floor((atMs - span.startMs) / STEP_MS);
}
