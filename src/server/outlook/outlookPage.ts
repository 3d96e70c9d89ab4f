import {
  OUTLOOK_DAYS,
  parseOutlookQuestion,
  type OutlookQuestion,
} from '../../domain/outlook/question';
import { regionNamed, regionStations } from '../../domain/outlook/regions';
import { bestWeekends, weekendsOf, type Weekend } from '../../domain/outlook/weekends';
import { outlookDays, type OutlookDay, type OutlookSearch } from '../../domain/outlook/year';
import { bandById } from '../../domain/station/bands';
import { DAY_MS } from '../../domain/time/interval';
import type { WindowStation } from '../../domain/window/types';
import type { Viewer } from '../auth/viewer';
import { Remembered } from '../remembered';
import type { Services } from '../services';
import { loadSearchData } from '../windows/loadSearchData';

/** Who stands for one end of the path. */
export interface OutlookEnd {
  /** "Europe", a call sign or a locator. */
  name: string;
  /** What stands for it in an address of the windows page; null for a region. */
  token: string | null;
  stations: WindowStation[];
}

export interface OutlookYear {
  here: OutlookEnd;
  there: OutlookEnd;
  days: readonly OutlookDay[];
  weekends: Weekend[];
  best: Weekend[];
}

export interface OutlookPage {
  question: OutlookQuestion;
  problems: string[];
  /** Null where an end of the question could not be found. */
  year: OutlookYear | null;
}

const SHOWN_WEEKENDS = 12;

/** Years lately asked for: about 60 kB each. All that a year depends on is its search, so none grows old. */
const years = new Remembered<readonly OutlookDay[]>(100);

function rememberedDays(search: OutlookSearch): readonly OutlookDay[] {
  return years.of(JSON.stringify(search), () => outlookDays(search));
}

/** The year ahead between two ends, with its best weekends. */
export async function outlookPage(
  services: Services,
  viewer: Pick<Viewer, 'id'> | null,
  params: URLSearchParams,
): Promise<OutlookPage> {
  const { question, problems } = parseOutlookQuestion(params, services.now());
  const here = await findEnd(services, viewer, question.here, question.fromMs);
  const there = await findEnd(services, viewer, question.there, question.fromMs);
  for (const end of [here, there]) if (typeof end === 'string') problems.push(end);
  if (typeof here === 'string' || typeof there === 'string') {
    return { question, problems, year: null };
  }
  if (here.token !== null && here.name === there.name) {
    problems.push(`${here.name} stands at both ends. Choose another place or a region for one.`);
    return { question, problems, year: null };
  }
  const days = rememberedDays({
    fromMs: question.fromMs,
    days: OUTLOOK_DAYS,
    frequencyMhz: bandById(question.band).centreMhz,
    here: here.stations,
    there: there.stations,
  });
  const weekends = weekendsOf(days);
  const best = bestWeekends(weekends, SHOWN_WEEKENDS);
  return { question, problems, year: { here, there, days, weekends, best } };
}

/** A region, a station or a place, or a sentence why it is none; usable hours are left aside. */
async function findEnd(
  services: Services,
  viewer: Pick<Viewer, 'id'> | null,
  text: string,
  fromMs: number,
): Promise<OutlookEnd | string> {
  const region = regionNamed(text);
  if (region) return { name: region, token: null, stations: regionStations(region) };
  const day = { startMs: fromMs, endMs: fromMs + DAY_MS };
  const { stations, problems } = await loadSearchData(services, viewer, [text], day);
  const station = stations[0];
  if (!station) return problems[0]!.sentence;
  const { callSign, site, sky, token } = station;
  return { name: callSign, token, stations: [{ callSign, site, sky }] };
}
