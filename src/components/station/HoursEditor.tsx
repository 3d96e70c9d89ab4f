import { useState } from 'react';
import { hoursUpdateSchema, type StationHours } from '../../domain/station/schema';
import { formatLocal } from '../../domain/time/format';
import type { Weekday, WeeklyStretch } from '../../domain/time/weeklyHours';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { IslandForm } from '../ui/IslandForm';
import { ProblemSummary } from '../ui/Notices';
import { DaysOff } from './DaysOff';
import { SaveBar } from './SaveBar';
import { useEditor } from './useEditor';
import { WeekResult } from './WeekResult';
import { WeekTable } from './WeekTable';

interface Props {
  station: { id: string; version: number; timeZone: string; hours: StationHours };
  nowMs: number;
}

const WEEKDAYS: Weekday[] = [1, 2, 3, 4, 5];
const WEEKEND: Weekday[] = [6, 7];
const on = (days: Weekday[], from: string, to: string): WeeklyStretch[] =>
  days.map((weekday) => ({ weekday, from, to }));

const PRESETS: { label: string; weekly: WeeklyStretch[] | null }[] = [
  { label: 'All hours', weekly: null },
  {
    label: 'Evenings and weekends',
    weekly: [...on(WEEKDAYS, '17:00', '23:00'), ...on(WEEKEND, '07:00', '23:30')],
  },
  { label: 'Awake, 07:00–23:00', weekly: on([...WEEKDAYS, ...WEEKEND], '07:00', '23:00') },
  { label: 'Weekends only', weekly: on(WEEKEND, '00:00', '24:00') },
];

/** When its people are awake and there, by the clock on their wall, and what that is in UTC. */
export function HoursEditor({ station, nowMs }: Props) {
  const [hours, setHours] = useState(station.hours);
  const editor = useEditor({
    url: paths.api.stationHours(station.id),
    schema: hoursUpdateSchema,
    version: station.version,
  });
  const change = (part: Partial<StationHours>) => {
    setHours({ ...hours, ...part });
    editor.touch();
  };
  return (
    <IslandForm
      noValidate
      className="columns columns--detail"
      onSubmit={(event) => {
        event.preventDefault();
        void editor.submit({ hours });
      }}
    >
      <div className="stack stack--wide">
        <ProblemSummary problems={editor.problems} />
        <p>
          Times are by the clock on the wall in {station.timeZone.replaceAll('_', ' ')}, now{' '}
          {formatLocal(nowMs, station.timeZone)}. They stay right when clocks change. A time “to”
          that is not after “from” is on the next day.
        </p>
        <div className="stack">
          <p className="label" id="presets">
            Begin with
          </p>
          <div className="row" role="group" aria-labelledby="presets">
            {PRESETS.map(({ label, weekly }) => (
              <Button key={label} onClick={() => change({ weekly })}>
                {label}
              </Button>
            ))}
          </div>
        </div>
        <WeekTable
          weekly={hours.weekly}
          errorOf={editor.errorOf}
          onChange={(weekly) => change({ weekly })}
        />
        <DaysOff daysOff={hours.daysOff} onChange={(daysOff) => change({ daysOff })} />
        <SaveBar editor={editor} label="Save the hours" done="The hours are saved." />
      </div>
      <WeekResult hours={{ ...hours, timeZone: station.timeZone }} nowMs={nowMs} />
    </IslandForm>
  );
}
