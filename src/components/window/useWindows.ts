import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import { LayersCache, windowLayers, type WindowLayers } from '../../domain/window/layers';
import { questionParams, utcDate, type WindowQuestion } from '../../domain/window/question';
import type { SearchData } from '../../domain/window/searchData';
import { paths } from '../../paths';

/** A refusal of the API as it reaches an island. */
export class ApiProblem extends Error {
  constructor(
    message: string,
    readonly body: { alternatives?: { start: string; end: string }[] },
  ) {
    super(message);
  }
}

/** JSON from the API; throws `ApiProblem` with the sentence for people. */
export async function callApi<T>(url: string, init?: RequestInit): Promise<T> {
  const response = await fetch(url, init);
  const body = (await response.json().catch(() => null)) as
    (T & { error?: { message: string } }) | null;
  if (!response.ok || body === null) {
    const sentence = body?.error?.message ?? 'The server did not answer. Try again in a moment.';
    throw new ApiProblem(sentence, (body?.error ?? {}) as ApiProblem['body']);
  }
  return body;
}

interface Answering {
  data: SearchData;
  layers: WindowLayers | null;
  loading: boolean;
  problem: string | null;
  cache: LayersCache;
}

/**
 * The answer to the question, computed here. Only other stations or dates ask the server, for hours and skeds;
 * everything else recomputes what it touches.
 */
export function useWindows(
  question: WindowQuestion,
  first: { question: WindowQuestion; data: SearchData },
): Answering {
  const [cache] = useState(() => new LayersCache());
  const params = new URLSearchParams([
    ...question.stations.map((token) => ['station', token]),
    ['from', utcDate(question.fromMs)],
    ['days', String(question.days)],
  ] as [string, string][]).toString();
  const same =
    question.fromMs === first.question.fromMs &&
    question.days === first.question.days &&
    question.stations.join() === first.question.stations.join();
  const query = useQuery({
    queryKey: ['searchData', params],
    queryFn: () => callApi<SearchData>(`${paths.api.searchData}?${params}`),
    ...(same ? { initialData: first.data } : {}),
    placeholderData: keepPreviousData,
    staleTime: 60_000,
    retry: 1,
  });
  const data = query.data ?? first.data;
  const ready =
    !query.isPlaceholderData &&
    data.stations.length >= 2 &&
    data.stations.length === question.stations.length;
  const layers = useMemo(
    () => (ready ? windowLayers(question, data.stations, cache) : null),
    [ready, question, data.stations, cache],
  );
  const [shown, setShown] = useState(layers);
  if (layers !== null && layers !== shown) setShown(layers);
  const waiting = query.isFetching && layers === null;
  return {
    data,
    layers: layers ?? (waiting ? shown : null),
    loading: waiting,
    problem: query.error ? query.error.message : null,
    cache,
  };
}

/** Keeps the address in step with the question, so that it can be copied at any moment. */
export function useAddress(question: WindowQuestion): void {
  useEffect(() => {
    const timer = setTimeout(() => {
      const url = `${paths.windows}?${questionParams(question).toString()}`;
      window.history.replaceState(null, '', url);
    }, 200);
    return () => clearTimeout(timer);
  }, [question]);
}
