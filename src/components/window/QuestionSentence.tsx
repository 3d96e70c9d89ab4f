import { BANDS, type BandId } from '../../domain/station/bands';
import { defaultMode, MODES, type ModeId } from '../../domain/station/modes';
import { formatDay, formatDuration, formatNumber } from '../../domain/time/format';
import { MINUTE_MS } from '../../domain/time/interval';
import {
  FEWEST_DAYS,
  MOST_DAYS,
  MOST_STATIONS,
  utcDate,
  type WindowQuestion,
} from '../../domain/window/question';
import type { ChosenStation, StationChoice } from '../../domain/window/searchData';
import { Button } from '../ui/Button';
import { ElevationPick } from './ElevationPick';
import { NumberPick } from './NumberPick';
import { StationPick } from './StationPick';
import { PickSelect, ValuePick } from './ValuePick';

interface Props {
  question: WindowQuestion;
  stations: ChosenStation[];
  own: StationChoice[];
  /** Whether margins are known, so that a limit of them means something. */
  byMargin: boolean;
  onChange: (question: WindowQuestion) => void;
}

const LENGTHS = [10, 20, 30, 45, 60, 90, 120, 180];
const ORDINALS = [
  'First',
  'Second',
  'Third',
  'Fourth',
  'Fifth',
  'Sixth',
  'Seventh',
  'Eighth',
  'Ninth',
];

/** What is asked, as one sentence whose values are its fields. */
export function QuestionSentence({ question, stations, own, byMargin, onChange }: Props) {
  const change = (part: Partial<WindowQuestion>) => onChange({ ...question, ...part });
  const setStation = (index: number, token: string) => {
    const tokens = [...question.stations];
    const lows = [...question.lowestDeg];
    tokens[index] = token;
    lows[index] = null;
    change({ stations: tokens, lowestDeg: lows });
  };
  const remove = (index: number) =>
    change({
      stations: question.stations.filter((_, at) => at !== index),
      lowestDeg: question.lowestDeg.filter((_, at) => at !== index),
    });
  // Whoever has not chosen a mode keeps what is proposed on each band.
  const setBand = (band: BandId) =>
    change({
      band,
      mode: question.mode === defaultMode(question.band) ? defaultMode(band) : question.mode,
    });
  const setLow = (index: number, lowestDeg: number | null) =>
    change({ lowestDeg: question.lowestDeg.map((low, at) => (at === index ? lowestDeg : low)) });
  const chosen = stations.flatMap((station) => [station.token, station.callSign]);
  const both = question.stations.length === 2 ? 'both' : 'all';
  const count = question.stations.length;
  const offersMargin = question.minimumMarginDb === null && byMargin;

  return (
    <div className="question">
      {stations.map((station, index) => (
        <span key={station.token} className="question__part">
          <span>{index === 0 ? 'Between' : index === stations.length - 1 ? 'and' : 'with'}</span>
          <StationPick
            station={station}
            label={`${ORDINALS[index] ?? 'Next'} station`}
            own={own}
            chosen={chosen}
            onChoose={(token) => setStation(index, token)}
            onRemove={count > 2 ? () => remove(index) : undefined}
          />
        </span>
      ))}
      {count < 2 ? (
        <span className="question__part">
          <span>{count === 0 ? 'Between' : 'and'}</span>
          <StationPick
            label={count === 0 ? 'a station' : 'a partner'}
            own={own}
            chosen={chosen}
            onChoose={(token) => setStation(count, token)}
          />
        </span>
      ) : null}
      <span className="question__part">
        <span>on</span>
        <PickSelect
          label="Band"
          value={question.band}
          options={BANDS.map((band) => ({ value: band.id, label: band.label }))}
          onChange={(band) => setBand(band as BandId)}
        />
      </span>
      <span className="question__part">
        <span>with</span>
        <PickSelect
          label="Mode"
          value={question.mode ?? ''}
          options={[
            ...MODES.map((mode) => ({ value: mode.id, label: mode.label })),
            { value: '', label: 'any mode' },
          ]}
          onChange={(mode) => change({ mode: mode === '' ? null : (mode as ModeId) })}
        />
      </span>
      <span className="question__part">
        <span>for</span>
        <DatesPick question={question} onChange={change} />
      </span>
      <span className="question__part">
        <span>counting</span>
        <PickSelect
          label="Hours that count"
          value={question.counting}
          options={[
            { value: 'awake', label: `hours when ${both} are awake` },
            { value: 'any', label: 'all hours' },
          ]}
          onChange={(counting) => change({ counting: counting as WindowQuestion['counting'] })}
        />
      </span>
      {stations.map((station, index) => (
        <span key={station.token} className="question__part">
          <span>{index === 0 ? 'with the Moon above' : 'and'}</span>
          <ElevationPick
            station={station}
            asked={question.lowestDeg[index] ?? null}
            onChange={(lowest) => setLow(index, lowest)}
          />
        </span>
      ))}
      <span className="question__part">
        <span>for at least</span>
        <PickSelect
          label="Shortest window"
          value={String(question.minimumMinutes)}
          options={[...new Set([...LENGTHS, question.minimumMinutes])]
            .sort((a, b) => a - b)
            .map((minutes) => ({
              value: String(minutes),
              label: formatDuration(minutes * MINUTE_MS),
            }))}
          onChange={(minutes) => change({ minimumMinutes: Number(minutes) })}
        />
      </span>
      {question.maximumDegradationDb === null ? null : (
        <span className="question__part">
          <span>losing at most</span>
          <NumberPick
            label="Largest degradation"
            unit="dB"
            value={question.maximumDegradationDb}
            least={0}
            most={15}
            step={0.1}
            note="Against the Moon at its nearest, in front of the coldest sky it passes."
            onChange={(value) => change({ maximumDegradationDb: value })}
          />
        </span>
      )}
      {question.minimumMarginDb === null ? null : (
        <span className="question__part">
          <span>with a margin of at least</span>
          <NumberPick
            label="Least margin"
            unit="dB"
            value={question.minimumMarginDb}
            least={-10}
            most={20}
            step={0.1}
            note="Of the weaker direction, over what the mode needs."
            onChange={(value) => change({ minimumMarginDb: value })}
          />
        </span>
      )}
      {question.minimumSunSeparationDeg === null ? null : (
        <span className="question__part">
          <span>at least</span>
          <NumberPick
            label="Least distance from the Sun"
            unit="°"
            value={question.minimumSunSeparationDeg}
            least={0}
            most={90}
            step={1}
            note="Between the centres of Moon and Sun, for every station."
            onChange={(value) => change({ minimumSunSeparationDeg: value })}
          />
          <span>from the Sun</span>
        </span>
      )}
      <span className="question__part question__tools">
        {count >= 2 && count < MOST_STATIONS ? (
          <StationPick
            label={`${ORDINALS[count] ?? 'Next'} station`}
            own={own}
            chosen={chosen}
            onChoose={(token) => setStation(count, token)}
          />
        ) : null}
        {question.maximumDegradationDb === null ||
        offersMargin ||
        question.minimumSunSeparationDeg === null ? (
          <ValuePick label="More limits" value="Limit" plain>
            {(close) => (
              <div className="stack">
                {offersMargin ? (
                  <Button
                    onClick={() => {
                      change({ minimumMarginDb: 0 });
                      close();
                    }}
                  >
                    Margin at least {formatNumber(0, 1)} dB
                  </Button>
                ) : null}
                {question.maximumDegradationDb === null ? (
                  <Button
                    onClick={() => {
                      change({ maximumDegradationDb: 2.5 });
                      close();
                    }}
                  >
                    Degradation at most {formatNumber(2.5, 1)} dB
                  </Button>
                ) : null}
                {question.minimumSunSeparationDeg === null ? (
                  <Button
                    onClick={() => {
                      change({ minimumSunSeparationDeg: 15 });
                      close();
                    }}
                  >
                    At least 15° from the Sun
                  </Button>
                ) : null}
              </div>
            )}
          </ValuePick>
        ) : null}
      </span>
    </div>
  );
}

function DatesPick({
  question,
  onChange,
}: {
  question: WindowQuestion;
  onChange: (part: Partial<WindowQuestion>) => void;
}) {
  return (
    <ValuePick
      label="Dates"
      value={`${question.days} days`}
      beside={`from ${formatDay(question.fromMs).replace(/^\S+ /, '')}`}
    >
      {() => (
        <div className="stack">
          <div className="field">
            <label className="field__label" htmlFor="from-date">
              First day, UTC
            </label>
            <input
              id="from-date"
              type="date"
              className="field__control"
              min="2000-01-01"
              max="2099-12-31"
              value={utcDate(question.fromMs)}
              onChange={(event) => {
                const fromMs = Date.parse(`${event.target.value}T00:00:00Z`);
                if (!Number.isNaN(fromMs) && /^20/.test(event.target.value)) onChange({ fromMs });
              }}
            />
          </div>
          <div className="field">
            <label className="field__label" htmlFor="days">
              Days, {FEWEST_DAYS} to {MOST_DAYS}
            </label>
            <div className="pick__slide">
              <input
                id="days"
                type="range"
                min={FEWEST_DAYS}
                max={MOST_DAYS}
                value={question.days}
                onChange={(event) => onChange({ days: Number(event.target.value) })}
              />
              <output className="pick__output" htmlFor="days">
                {question.days}
              </output>
            </div>
          </div>
        </div>
      )}
    </ValuePick>
  );
}
