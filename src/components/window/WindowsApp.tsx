import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useCallback, useDeferredValue, useMemo, useState } from 'react';
import type { WindowQuestion } from '../../domain/window/question';
import type { SearchData, StationChoice } from '../../domain/window/searchData';
import { MonthRaster } from '../chart/MonthRaster';
import { RasterLegend } from '../chart/RasterLegend';
import { axisNotes } from '../chart/rasterView';
import type { Answer } from './answer';
import { BestFirst } from './BestFirst';
import { choiceOf, chosenIn, type Choice } from './choice';
import { ChosenWindow } from './ChosenWindow';
import { DayStrips } from './DayStrips';
import { limitDegrees } from './limitDegrees';
import { listedWindows } from './listedWindows';
import { NothingHere } from './NothingHere';
import { QuestionSentence } from './QuestionSentence';
import { Summary } from './Summary';
import { useAddress, useWindows } from './useWindows';
import { useWidth } from './useWidth';

interface Props {
  question: WindowQuestion;
  data: SearchData;
  own: StationChoice[];
  nowMs: number;
  signedIn: boolean;
  /** Sign-in page that leads back here. */
  signInPath: string;
}

const queryClient = new QueryClient();
const NARROW = 520;

/** The windows page: a question, the month that answers it, and one window of it in full. */
export default function WindowsApp(props: Props) {
  return (
    <QueryClientProvider client={queryClient}>
      <Windows {...props} />
    </QueryClientProvider>
  );
}

function Windows({ question: firstQuestion, data: firstData, own, nowMs, ...viewer }: Props) {
  const [question, setQuestion] = useState(firstQuestion);
  const [choice, setChoice] = useState<Choice | null>(null);
  const [first] = useState({ question: firstQuestion, data: firstData });
  const [work, width] = useWidth<HTMLDivElement>();
  const { data, layers, loading, problem, cache } = useWindows(question, first);
  useAddress(question);

  const { stations, taken } = data;
  const answer = useMemo<Answer | null>(
    () =>
      layers && {
        question,
        stations,
        taken,
        layers,
        degreesOf: limitDegrees(question, stations),
      },
    [question, stations, taken, layers],
  );
  // The raster follows a dragged limit at once; detail and table may come a moment later.
  const calm = useDeferredValue(answer);
  const live = useMemo(() => layers && chosenIn(layers, choice), [layers, choice]);
  const shown = useMemo(() => calm && chosenIn(calm.layers, choice), [calm, choice]);
  const windows = layers?.windows;
  const choose = useCallback(
    (index: number, atMs: number | null) => {
      const picked = windows?.[index];
      if (picked) setChoice(choiceOf(picked, atMs));
    },
    [windows],
  );
  const chooseListed = useCallback((index: number) => choose(index, null), [choose]);
  const listed = useMemo(() => (calm ? listedWindows(calm, cache) : []), [calm, cache]);
  const notes = useMemo(
    () => axisNotes(stations, question.fromMs, question.days),
    [stations, question.fromMs, question.days],
  );
  const drawn = { stations, taken, chosen: live?.index ?? null, onChoose: choose };
  const callSigns = stations.map((station) => station.callSign);

  return (
    <div className="windows" aria-busy={loading}>
      <QuestionSentence
        question={question}
        stations={stations}
        own={own}
        byMargin={layers?.judge.basis === 'margin'}
        onChange={setQuestion}
      />
      {problem ? (
        <p className="notice notice--problem" role="alert">
          {problem}
        </p>
      ) : null}
      {calm ? (
        <Summary answer={calm} />
      ) : (
        <p className="windows__sum quiet">
          {stations.length < 2
            ? 'Choose two stations or more: from the list, or any place by its locator.'
            : 'Computing the month.'}
        </p>
      )}
      {layers ? (
        <div className="columns columns--detail">
          <div ref={work} className="windows__work">
            {width === 0 ? null : width < NARROW ? (
              <DayStrips {...drawn} layers={layers} />
            ) : (
              <MonthRaster
                {...drawn}
                fromMs={question.fromMs}
                days={question.days}
                width={width}
                layers={layers}
                nowMs={nowMs}
                cursorMs={live?.choice.cursorMs}
                slot={live?.choice.slot}
                label={`Common windows of ${callSigns.join(', ')} by day; the table “Best first” says the same`}
              />
            )}
            <RasterLegend
              basis={layers.judge.basis}
              callSigns={callSigns}
              hoursKnown={stations.some((station) => station.usable !== undefined)}
              countsHours={question.counting === 'awake'}
              skeds={taken.length > 0}
            />
            <p className="label">
              {layers.judge.sentence}
              {question.minimumMarginDb !== null && layers.judge.basis === 'degradation'
                ? ' Your least margin does not count meanwhile.'
                : ''}
            </p>
            {notes.map((note) => (
              <p key={note} className="label">
                {note}
              </p>
            ))}
          </div>
          {calm && shown ? (
            <ChosenWindow
              answer={calm}
              chosen={shown}
              onChoice={setChoice}
              signedIn={viewer.signedIn}
              signInHref={viewer.signInPath}
              nowMs={nowMs}
            />
          ) : (
            <NothingHere layers={layers} question={question} onChange={setQuestion} />
          )}
        </div>
      ) : null}
      {calm && listed.length > 0 ? (
        <BestFirst
          layers={calm.layers}
          listed={listed}
          stations={calm.stations}
          chosen={shown?.index ?? null}
          onChoose={chooseListed}
        />
      ) : null}
    </div>
  );
}
