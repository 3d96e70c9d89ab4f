import { QueryClient, QueryClientProvider, useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { RunView } from '../../domain/activity/run';
import { isOpen, progressFacts, runSentence } from '../../domain/activity/runWords';
import { paths } from '../../paths';

interface Props {
  slug: string;
  run: RunView;
}

const EVERY_MS = 1000;

/** How far a run is. Rendered by the server; in the browser it asks again each second until the run has ended. */
export function RunProgress(props: Props) {
  const [client] = useState(() => new QueryClient());
  return (
    <QueryClientProvider client={client}>
      <Watched {...props} />
    </QueryClientProvider>
  );
}

function Watched({ slug, run: first }: Props) {
  const { data: run, isError } = useQuery({
    queryKey: ['planRun', slug],
    queryFn: () => fetchRun(slug),
    initialData: first,
    // What the page was made with is as old as the page.
    initialDataUpdatedAt: 0,
    enabled: isOpen(first),
    retry: 10,
    refetchInterval: ({ state }) => (state.data && isOpen(state.data) ? EVERY_MS : false),
  });
  const ended = isOpen(first) && !isOpen(run);
  useEffect(() => {
    // The draft, and what can be done with it, stand on the page of the server.
    if (ended) location.reload();
  }, [ended]);
  return (
    <div className="stack">
      <p aria-live="polite">
        <strong>{runSentence(run)}</strong>
      </p>
      {run.progress ? (
        <dl className="facts">
          {progressFacts(run.progress, run.wishes).map(([term, value]) => (
            <div key={term}>
              <dt>{term}</dt>
              <dd>{value}</dd>
            </div>
          ))}
        </dl>
      ) : null}
      {isError ? (
        <p className="quiet">The server does not answer. Reload the page to see how far it is.</p>
      ) : null}
    </div>
  );
}

async function fetchRun(slug: string): Promise<RunView> {
  const response = await fetch(paths.api.activityPlan(slug));
  if (!response.ok) throw new Error(`The plan could not be read (${response.status}).`);
  return ((await response.json()) as { run: RunView }).run;
}
