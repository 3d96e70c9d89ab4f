import type { BandEquipment } from '../../domain/station/views';
import { expandUsableHours, type WeeklyStretch } from '../../domain/time/weeklyHours';
import { LayersCache, windowLayers } from '../../domain/window/layers';
import { emptyQuestion, questionSpan } from '../../domain/window/question';
import { bestFirst } from '../../domain/window/ranking';
import type { ChosenStation } from '../../domain/window/searchData';
import type { Answer } from '../window/answer';
import { detailView, type DetailView } from '../window/detailView';
import { limitDegrees } from '../window/limitDegrees';

/** Two invented stations, so that the front page shows what the product does, with the Moon of today. */
const PAIR: (Omit<ChosenStation, 'usable' | 'id' | 'own' | 'token'> & {
  weekly: WeeklyStretch[];
})[] = [
  {
    callSign: 'QA1LUN',
    placeName: 'the Birch coast',
    locator: 'JO98',
    site: { latitudeDeg: 58.4, longitudeDeg: 18.6, heightM: 20 },
    timeZone: 'Europe/Stockholm',
    equipment: dish(2.4, 150),
    sky: {
      elevationFromDeg: 8,
      blocked: [
        {
          azimuthFromDeg: 258,
          azimuthToDeg: 278,
          elevationFromDeg: 0,
          elevationToDeg: 18,
          name: 'barn',
        },
        {
          azimuthFromDeg: 118,
          azimuthToDeg: 138,
          elevationFromDeg: 0,
          elevationToDeg: 26,
          name: 'lime tree',
        },
      ],
      horizon: hills([2, 4, 3, 1, 2, 3, 1, 2]),
    },
    weekly: everyDay('17:00', '00:30'),
  },
  {
    callSign: 'QB7TID',
    placeName: 'the Granite hills',
    locator: 'FN43',
    site: { latitudeDeg: 43.8, longitudeDeg: -71.6, heightM: 240 },
    timeZone: 'America/New_York',
    equipment: dish(1.9, 70),
    sky: {
      elevationFromDeg: 10,
      blocked: [
        {
          azimuthFromDeg: 56,
          azimuthToDeg: 78,
          elevationFromDeg: 0,
          elevationToDeg: 22,
          name: 'ridge',
        },
        {
          azimuthFromDeg: 196,
          azimuthToDeg: 216,
          elevationFromDeg: 0,
          elevationToDeg: 20,
          name: 'silo',
        },
      ],
      horizon: hills([3, 2, 5, 2, 1, 2, 2, 4]),
    },
    weekly: everyDay('06:30', '23:00'),
  },
];

function dish(diameterM: number, powerAtFeedW: number): BandEquipment[] {
  return [
    {
      band: '1296',
      setup: {
        antenna: { kind: 'dish', diameterM, apertureEfficiency: 0.55 },
        polarization: 'rightCircular',
        powerAtFeedW,
        receive: { kind: 'measured', systemTemperatureK: 60 },
      },
    },
  ];
}

function everyDay(from: string, to: string): WeeklyStretch[] {
  return ([1, 2, 3, 4, 5, 6, 7] as const).map((weekday) => ({ weekday, from, to }));
}

function hills(elevationsDeg: number[]) {
  return elevationsDeg.map((elevationDeg, index) => ({
    azimuthDeg: (index * 360) / elevationsDeg.length,
    elevationDeg,
  }));
}

export interface DemoMonth {
  answer: Answer;
  /** The best window of the month; null in a month without one. */
  best: { index: number; view: DetailView } | null;
}

let kept: { fromMs: number; month: DemoMonth } | undefined;

/** Thirty days from today; computed once a day in each process. */
export function demoMonth(nowMs: number): DemoMonth {
  const question = { ...emptyQuestion(nowMs), stations: PAIR.map((station) => station.callSign) };
  if (kept?.fromMs === question.fromMs) return kept.month;
  const span = questionSpan(question);
  const stations = PAIR.map(({ weekly, ...station }) => ({
    ...station,
    id: null,
    own: false,
    token: station.callSign,
    usable: expandUsableHours({ timeZone: station.timeZone!, weekly, daysOff: [] }, span),
  }));
  question.lowestDeg = stations.map(() => null);
  const layers = windowLayers(question, stations, new LayersCache());
  const answer = {
    question,
    stations,
    taken: [],
    layers,
    degreesOf: limitDegrees(question, stations),
  };
  const index = bestFirst(layers.windows, layers.windowQuality)[0];
  const best =
    index === undefined ? null : { index, view: detailView(layers.windows[index]!, stations) };
  kept = { fromMs: question.fromMs, month: { answer, best } };
  return kept.month;
}
