import { useId, useState } from 'react';
import { GUEST_DEFAULTS, GUEST_DEFAULTS_SENTENCE } from '../../domain/guest/guest';
import { guestToken, readGuestToken } from '../../domain/guest/token';
import { isLocator, normalizeLocator } from '../../domain/locator/locator';
import { callSignProblem } from '../../domain/station/callSign';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { TextField } from '../ui/Field';

interface Props {
  callSign: string;
  onChoose: (token: string) => void;
  onBack: () => void;
}

const EMPTY = {
  locator: '',
  timeZone: '',
  elevationFrom: '',
  elevationTo: '',
  azimuthFrom: '',
  azimuthTo: '',
  hoursFrom: '',
  hoursTo: '',
  diameter: '',
  power: '',
};

/** A partner without an account: enough to compute windows with. The mail address is asked for with the offer. */
export function GuestForm({ callSign: given, onChoose, onBack }: Props) {
  const id = useId();
  const [callSign, setCallSign] = useState(given);
  const [fields, setFields] = useState(EMPTY);
  const [tried, setTried] = useState(false);
  const zones = Intl.supportedValuesOf('timeZone');
  const read = readFields(callSign, fields);
  const problem = (name: string) =>
    tried && 'field' in read && read.field === name ? read.message : undefined;
  const choose = () => {
    setTried(true);
    if ('token' in read) onChoose(read.token);
  };
  const field = (name: keyof typeof EMPTY) => ({
    id: `${id}-${name}`,
    value: fields[name],
    autoComplete: 'off',
    error: problem(name),
    onChange: (event: { target: { value: string } }) =>
      setFields({ ...fields, [name]: event.target.value }),
  });
  return (
    // Inside another form, so that it cannot be one of its own: Enter in a field chooses.
    // eslint-disable-next-line jsx-a11y/no-noninteractive-element-interactions
    <div
      className="stack"
      role="group"
      aria-label="Somebody not registered"
      onKeyDown={(event) => {
        if (event.key !== 'Enter' || !(event.target instanceof HTMLInputElement)) return;
        event.preventDefault();
        choose();
      }}
    >
      <div className="grid grid-cols-2 gap-3">
        <TextField
          id={`${id}-callSign`}
          label="Call sign"
          autoComplete="off"
          autoCapitalize="characters"
          spellCheck={false}
          maxLength={12}
          value={callSign}
          error={problem('callSign')}
          onChange={(event) => setCallSign(event.target.value)}
        />
        <TextField {...field('locator')} label="Locator" spellCheck={false} maxLength={10} />
      </div>
      <details>
        <summary>Sky, hours, equipment: if you know them</summary>
        <div className="stack mt-2">
          <div className="grid grid-cols-2 gap-3">
            <TextField
              {...field('elevationFrom')}
              label="Elevation from, °"
              inputMode="decimal"
              placeholder={String(GUEST_DEFAULTS.elevationFromDeg)}
            />
            <TextField
              {...field('elevationTo')}
              label="Elevation to, °"
              inputMode="decimal"
              placeholder="90"
            />
            <TextField
              {...field('azimuthFrom')}
              label="Azimuth from, °"
              inputMode="decimal"
              placeholder="all round"
            />
            <TextField
              {...field('azimuthTo')}
              label="Azimuth to, °"
              inputMode="decimal"
              placeholder="all round"
            />
            <TextField
              {...field('hoursFrom')}
              label="Usable from"
              inputMode="numeric"
              placeholder={GUEST_DEFAULTS.hours.from}
            />
            <TextField
              {...field('hoursTo')}
              label="Usable to"
              inputMode="numeric"
              placeholder={GUEST_DEFAULTS.hours.to}
            />
            <TextField {...field('diameter')} label="Dish, m" inputMode="decimal" />
            <TextField {...field('power')} label="Power at the feed, W" inputMode="decimal" />
          </div>
          <TextField
            {...field('timeZone')}
            label="Time zone"
            list={`${id}-zones`}
            placeholder="of the longitude"
          />
          <datalist id={`${id}-zones`}>
            {zones.map((name) => (
              <option key={name} value={name} />
            ))}
          </datalist>
        </div>
      </details>
      <p className="field__note">{GUEST_DEFAULTS_SENTENCE}</p>
      <div className="row">
        <Button look="filled" onClick={choose}>
          Look for windows
        </Button>
        <Button look="bare" onClick={onBack}>
          Back to the list
        </Button>
      </div>
      <p className="field__note">
        Or enter everything in <a href={paths.newGuest}>one plain form for the whole offer</a>
      </p>
    </div>
  );
}

type Fields = typeof EMPTY;
type Read = { token: string } | { field: keyof Fields | 'callSign'; message: string };

/** What the fields say as a token, or the first thing that is wrong. */
function readFields(typedCallSign: string, fields: Fields): Read {
  const callSign = typedCallSign.trim().toUpperCase();
  const wrong = callSignProblem(callSign);
  if (wrong) return { field: 'callSign', message: wrong };
  if (!isLocator(fields.locator.trim())) {
    return { field: 'locator', message: 'Give a locator such as JO97ee.' };
  }
  const zone = fields.timeZone.trim();
  if (zone !== '' && zone !== 'UTC' && !Intl.supportedValuesOf('timeZone').includes(zone)) {
    return { field: 'timeZone', message: 'Choose a zone from the list, such as Europe/Stockholm.' };
  }
  const numbers: Partial<Record<keyof Fields, number>> = {};
  for (const [name, least, most] of RANGES) {
    const text = fields[name].trim().replace(',', '.');
    if (text === '') continue;
    const value = /^\d{1,5}(\.\d{1,2})?$/.test(text) ? Number(text) : NaN;
    if (!(value >= least && value <= most)) {
      return { field: name, message: `A number from ${least} to ${most}.` };
    }
    numbers[name] = value;
  }
  const { elevationFrom, elevationTo, azimuthFrom, azimuthTo, diameter, power } = numbers;
  if ((azimuthFrom === undefined) !== (azimuthTo === undefined)) {
    const field = azimuthFrom === undefined ? 'azimuthFrom' : 'azimuthTo';
    return { field, message: 'Give both ends, or neither.' };
  }
  if ((elevationFrom ?? GUEST_DEFAULTS.elevationFromDeg) >= (elevationTo ?? 90)) {
    return { field: 'elevationTo', message: 'Over the lowest elevation.' };
  }
  const clocks: Partial<Record<'hoursFrom' | 'hoursTo', string>> = {};
  for (const name of ['hoursFrom', 'hoursTo'] as const) {
    const text = fields[name].trim();
    if (text === '') continue;
    const match = /^([01]?\d|2[0-3])(?::?([0-5]\d))?$/.exec(text);
    if (!match && !(name === 'hoursTo' && /^24(:?00)?$/.test(text))) {
      return { field: name, message: 'A time such as 08:00.' };
    }
    clocks[name] = match ? `${match[1]!.padStart(2, '0')}:${match[2] ?? '00'}` : '24:00';
  }
  if ((diameter === undefined) !== (power === undefined)) {
    const field = diameter === undefined ? 'diameter' : 'power';
    return { field, message: 'A margin needs both, dish and power.' };
  }
  const token = guestToken({
    callSign,
    locator: normalizeLocator(fields.locator.trim()),
    ...(zone === '' ? {} : { timeZone: zone }),
    elevationFromDeg: elevationFrom,
    elevationToDeg: elevationTo,
    azimuthFromDeg: azimuthFrom,
    azimuthToDeg: azimuthTo,
    ...(clocks.hoursFrom === undefined && clocks.hoursTo === undefined
      ? {}
      : {
          hours: {
            from: clocks.hoursFrom ?? GUEST_DEFAULTS.hours.from,
            to: clocks.hoursTo ?? GUEST_DEFAULTS.hours.to,
          },
        }),
    ...(diameter === undefined || power === undefined
      ? {}
      : { dish: { diameterM: diameter, powerAtFeedW: power } }),
  });
  const sound = readGuestToken(token);
  return typeof sound === 'string' ? { field: 'azimuthTo', message: sound } : { token };
}

const RANGES = [
  ['elevationFrom', 0, 89],
  ['elevationTo', 1, 90],
  ['azimuthFrom', 0, 360],
  ['azimuthTo', 0, 360],
  ['diameter', 0.1, 100],
  ['power', 1, 10_000],
] as const;
