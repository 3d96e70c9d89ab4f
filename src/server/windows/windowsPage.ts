import { LayersCache, windowLayers, type WindowLayers } from '../../domain/window/layers';
import {
  parseQuestion,
  questionSpan,
  type QuestionProblem,
  type WindowQuestion,
} from '../../domain/window/question';
import type { SearchData, StationChoice } from '../../domain/window/searchData';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { listMyStations } from '../stations/listMyStations';
import { loadSearchData } from './loadSearchData';

export interface WindowsPage {
  question: WindowQuestion;
  problems: QuestionProblem[];
  data: SearchData;
  own: StationChoice[];
  /** Null with fewer than two stations. */
  layers: WindowLayers | null;
  cache: LayersCache;
}

/** Shared by the requests of this process; tables and timelines in it are bounded. */
const cache = new LayersCache();

/** Everything the windows page shows; without a station in the address the viewer's first own one is put in. */
export async function windowsPage(
  services: Services,
  viewer: Viewer | null,
  params: URLSearchParams,
): Promise<WindowsPage> {
  const mine = viewer ? await listMyStations(services, viewer) : [];
  const own = mine.map(({ id, callSign, name }) => ({
    id,
    callSign,
    placeName: name.trim() === '' ? null : name,
    own: true,
  }));
  const { question, problems } = parseQuestion(params, services.now());
  if (question.stations.length === 0 && own[0]) {
    question.stations.push(own[0].callSign);
    question.lowestDeg.push(null);
  }
  const span = questionSpan(question);
  const loaded = await loadSearchData(services, viewer, question.stations, span);
  const found = loaded.stations.map((station) => station.token);
  question.lowestDeg = found.map(
    (token) => question.lowestDeg[question.stations.indexOf(token)] ?? null,
  );
  question.stations = found;
  return {
    question,
    problems: [...problems, ...loaded.problems],
    data: { stations: loaded.stations, taken: loaded.taken },
    own,
    layers: found.length >= 2 ? windowLayers(question, loaded.stations, cache) : null,
    cache,
  };
}
