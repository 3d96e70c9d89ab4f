import type { EventClickArg, EventDropArg, EventInput } from '@fullcalendar/core';
import interactionPlugin, { type EventResizeDoneArg } from '@fullcalendar/interaction';
import listPlugin from '@fullcalendar/list';
import luxonPlugin from '@fullcalendar/luxon3';
import FullCalendar from '@fullcalendar/react';
import timeGridPlugin from '@fullcalendar/timegrid';
import {
  keepPreviousData,
  QueryClient,
  QueryClientProvider,
  useQuery,
  useQueryClient,
} from '@tanstack/react-query';
import { useMemo, useRef, useState } from 'react';
import { canBeMoved, type CalendarGround } from '../../domain/sked/calendarView';
import { partnersOf, type SkedSummary } from '../../domain/sked/view';
import { bandById } from '../../domain/station/bands';
import { formatClock, formatDay, zoneName } from '../../domain/time/format';
import { MINUTE_MS, type Interval } from '../../domain/time/interval';
import { Button } from '../ui/Button';
import { SelectField } from '../ui/Field';
import { Toast } from '../ui/Toast';
import { fetchCalendar } from './calendarApi';
import { SkedDialog } from './SkedDialog';

interface Props {
  timeZone: string;
  nowMs: number;
  grounds: CalendarGround[];
}

const VIEWS = [
  { id: 'timeGridWeek', word: 'Week' },
  { id: 'timeGridDay', word: 'Day' },
  { id: 'listWeek', word: 'List' },
] as const;
type ViewId = (typeof VIEWS)[number]['id'];

/** Common windows with a partner say more behind skeds than the Moon over one's own station. */
function firstGround(grounds: readonly CalendarGround[]): string {
  return (grounds.find(({ key }) => key.startsWith('pair:')) ?? grounds[0])?.key ?? '';
}

/** A shorter sked has room for one line. */
const TWO_LINES_MS = 45 * MINUTE_MS;

export function CalendarApp(props: Props) {
  const [client] = useState(
    () => new QueryClient({ defaultOptions: { queries: { staleTime: 60_000, retry: 1 } } }),
  );
  return (
    <QueryClientProvider client={client}>
      <Calendar {...props} />
    </QueryClientProvider>
  );
}

interface Chosen {
  sked: SkedSummary;
  wished?: Interval;
}

function Calendar({ timeZone, nowMs, grounds }: Props) {
  const calendar = useRef<FullCalendar>(null);
  const queries = useQueryClient();
  const [offsetMs] = useState(() => nowMs - Date.now());
  const [view, setView] = useState<ViewId>(() =>
    window.innerWidth < 768 ? 'timeGridDay' : 'timeGridWeek',
  );
  const [zone, setZone] = useState('UTC');
  const [ground, setGround] = useState(() => firstGround(grounds));
  const [shown, setShown] = useState<(Interval & { title: string }) | null>(null);
  const [chosen, setChosen] = useState<Chosen | null>(null);
  const [toast, setToast] = useState<string | null>(null);
  const { data, error } = useQuery({
    queryKey: ['calendar', shown?.startMs, shown?.endMs, ground],
    queryFn: () => fetchCalendar(shown!, ground),
    enabled: shown !== null,
    placeholderData: keepPreviousData,
  });
  const skeds = useMemo(() => new Map((data?.skeds ?? []).map((sked) => [sked.id, sked])), [data]);
  const events = useMemo(
    () => eventsOf(data?.skeds ?? [], data?.ground ?? [], nowMs),
    [data, nowMs],
  );
  const api = () => calendar.current!.getApi();
  const wish = (drag: EventDropArg | EventResizeDoneArg) => {
    const { start, end, id } = drag.event;
    drag.revert();
    const sked = skeds.get(id);
    if (!sked || !start || !end) return;
    const whole = (at: Date) => Math.round(at.getTime() / MINUTE_MS) * MINUTE_MS;
    setChosen({ sked, wished: { startMs: whole(start), endMs: whole(end) } });
  };

  const close = (skedId: string) => {
    setChosen(null);
    // The dialog leaves the page with its content, so that the browser cannot give the focus back by itself.
    requestAnimationFrame(() =>
      document.querySelector<HTMLElement>(`[data-sked-id="${CSS.escape(skedId)}"]`)?.focus(),
    );
  };

  return (
    <div className="stack">
      <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
        <div className="row">
          <Button
            icon="arrowLeft"
            aria-label={view === 'timeGridDay' ? 'Previous day' : 'Previous week'}
            onClick={() => api().prev()}
          >
            {' '}
          </Button>
          <Button
            icon="arrowRight"
            aria-label={view === 'timeGridDay' ? 'Next day' : 'Next week'}
            onClick={() => api().next()}
          >
            {' '}
          </Button>
          <Button onClick={() => api().today()}>Today</Button>
          <h2 aria-live="polite" className="min-w-44">
            {shown?.title ?? ''}
          </h2>
        </div>
        <div className="row">
          <div className="segments" role="group" aria-label="What is shown">
            {VIEWS.map(({ id, word }) => (
              <button
                key={id}
                type="button"
                aria-pressed={view === id}
                onClick={() => {
                  setView(id);
                  api().changeView(id);
                }}
              >
                {word}
              </button>
            ))}
          </div>
          <div className="segments" role="group" aria-label="Time zone">
            {[...new Set(['UTC', timeZone])].map((name) => (
              <button
                key={name}
                type="button"
                aria-pressed={zone === name}
                onClick={() => setZone(name)}
              >
                {name === 'UTC' ? 'UTC' : `You, ${zoneName(nowMs, name)}`}
              </button>
            ))}
          </div>
          {grounds.length > 0 ? (
            <SelectField
              id="ground"
              label="Behind the skeds"
              value={ground}
              onChange={(event) => setGround(event.target.value)}
            >
              {grounds.map(({ key, label }) => (
                <option key={key} value={key}>
                  {label}
                </option>
              ))}
              <option value="">nothing</option>
            </SelectField>
          ) : null}
        </div>
      </div>
      {error ? (
        <p className="notice notice--problem" role="alert">
          {error.message}
        </p>
      ) : null}
      <div className="calendar">
        <FullCalendar
          ref={calendar}
          plugins={[timeGridPlugin, listPlugin, interactionPlugin, luxonPlugin]}
          initialView={view}
          headerToolbar={false}
          timeZone={zone}
          locale="en-GB"
          firstDay={1}
          height="auto"
          allDaySlot={false}
          slotDuration="00:30:00"
          snapDuration="00:05:00"
          slotLabelInterval="02:00"
          slotLabelFormat={{ hour: '2-digit', minute: '2-digit', hour12: false }}
          eventTimeFormat={{ hour: '2-digit', minute: '2-digit', hour12: false }}
          dayHeaderContent={({ date }) => formatDay(date.getTime(), { timeZone: 'UTC' })}
          nowIndicator
          now={() => new Date(Date.now() + offsetMs).toISOString()}
          events={events}
          eventInteractive
          eventDurationEditable
          eventStartEditable
          eventOverlap
          displayEventEnd
          noEventsContent="No sked in this week."
          eventContent={({ event, view: within }) => {
            const sked = skeds.get(event.id);
            if (!sked) return null;
            if (within.type.startsWith('list')) return `${event.title}, ${stateWords(sked)}`;
            return (
              <>
                <span>
                  <strong>{partnersOf(sked.parties)}</strong> {formatClock(sked.startMs, zone)}–
                  {formatClock(sked.endMs, zone)}
                </span>
                {sked.endMs - sked.startMs >= TWO_LINES_MS ? (
                  <span>
                    {bandById(sked.band).label}, {stateWords(sked)}
                  </span>
                ) : null}
              </>
            );
          }}
          eventDidMount={({ el, event }) => {
            const sked = skeds.get(event.id);
            if (!sked) return;
            el.dataset['skedId'] = sked.id;
            el.setAttribute('role', 'button');
            el.setAttribute('aria-label', labelOf(sked, zone));
          }}
          eventClick={({ event, jsEvent }: EventClickArg) => {
            jsEvent.preventDefault();
            const sked = skeds.get(event.id);
            if (sked) setChosen({ sked });
          }}
          eventDrop={wish}
          eventResize={wish}
          datesSet={({ start, end, view: within }) =>
            setShown({
              title: within.title.replace(/ [–-] /, '–'),
              startMs: start.getTime(),
              endMs: end.getTime(),
            })
          }
        />
      </div>
      <p className="label">
        Filled: agreed. Dashed: offered. Grey ground:{' '}
        {grounds.find(({ key }) => key === ground)?.label ?? 'nothing'}. Drag a sked to offer
        another time, or press it (Enter) and type one; nothing moves before you confirm.
      </p>
      {chosen ? (
        <SkedDialog
          sked={chosen.sked}
          wished={chosen.wished}
          nowMs={nowMs}
          onClose={() => close(chosen.sked.id)}
          onMoved={(sentence) => {
            close(chosen.sked.id);
            setToast(sentence);
            void queries.invalidateQueries({ queryKey: ['calendar'] });
          }}
        />
      ) : null}
      {toast ? <Toast message={toast} onDone={() => setToast(null)} /> : null}
    </div>
  );
}

function eventsOf(
  skeds: readonly SkedSummary[],
  ground: readonly Interval[],
  nowMs: number,
): EventInput[] {
  return [
    ...ground.map(({ startMs, endMs }) => ({
      start: new Date(startMs).toISOString(),
      end: new Date(endMs).toISOString(),
      display: 'background',
      className: 'calendar__ground',
    })),
    ...skeds.map((sked) => ({
      id: sked.id,
      title: `${partnersOf(sked.parties)}, ${bandById(sked.band).label}`,
      start: new Date(sked.startMs).toISOString(),
      end: new Date(sked.endMs).toISOString(),
      editable: canBeMoved(sked, nowMs),
      className: `calendar__sked calendar__sked--${sked.waitsForViewer ? 'waiting' : sked.state}`,
    })),
  ];
}

function stateWords(sked: SkedSummary): string {
  return sked.waitsForViewer ? 'waits for you' : sked.state;
}

function labelOf(sked: SkedSummary, zone: string): string {
  const day = formatDay(sked.startMs, { timeZone: zone });
  const times = `${formatClock(sked.startMs, zone)} to ${formatClock(sked.endMs, zone)}`;
  return `Sked with ${partnersOf(sked.parties)}, ${day} ${times} ${zoneName(sked.startMs, zone)}, ${bandById(sked.band).label}, ${stateWords(sked)}`;
}
