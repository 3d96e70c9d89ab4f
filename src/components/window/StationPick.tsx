import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useEffect, useId, useRef, useState } from 'react';
import { isLocator, normalizeLocator } from '../../domain/locator/locator';
import type { PublicStationPage } from '../../domain/station/views';
import type { ChosenStation, StationChoice } from '../../domain/window/searchData';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { TextField } from '../ui/Field';
import { ValuePick } from './ValuePick';
import { GuestForm } from './GuestForm';
import { callApi } from './useWindows';

interface Props {
  /** Absent: adds a station. */
  station?: ChosenStation | undefined;
  label: string;
  own: StationChoice[];
  chosen: readonly string[];
  onChoose: (token: string) => void;
  onRemove?: (() => void) | undefined;
}

/** One station of the question: from the viewer's own, from the list, or a bare place by its locator. */
export function StationPick({ station, label, own, chosen, onChoose, onRemove }: Props) {
  const place = station
    ? (station.placeName ?? (station.callSign === station.locator ? null : station.locator))
    : null;
  return (
    <ValuePick label={label} value={station?.callSign ?? label} beside={place} plain={!station}>
      {(close) => (
        <StationPanel
          own={own}
          chosen={chosen}
          onChoose={(token) => {
            onChoose(token);
            close();
          }}
          onRemove={onRemove}
          callSign={station?.callSign}
        />
      )}
    </ValuePick>
  );
}

interface PanelProps extends Pick<Props, 'own' | 'chosen' | 'onChoose' | 'onRemove'> {
  callSign: string | undefined;
}

function StationPanel({ own, chosen, onChoose, onRemove, callSign }: PanelProps) {
  const id = useId();
  const field = useRef<HTMLInputElement>(null);
  const [text, setText] = useState('');
  const [guest, setGuest] = useState(false);
  const search = useDeferredValue(text.trim());
  useEffect(() => field.current?.focus(), []);
  const query = useQuery({
    queryKey: ['stations', search],
    queryFn: () =>
      callApi<PublicStationPage>(`${paths.api.stations}?${new URLSearchParams({ search })}`),
    staleTime: 60_000,
    placeholderData: (previous) => previous,
  });
  const matches = (choice: StationChoice) =>
    `${choice.callSign} ${choice.placeName ?? ''}`.toLowerCase().includes(search.toLowerCase());
  const ownIds = new Set(own.map((choice) => choice.id));
  const listed = (query.data?.stations ?? [])
    .filter((card) => !ownIds.has(card.id))
    .slice(0, 12)
    .map((card) => ({
      id: card.id,
      callSign: card.callSign,
      placeName: card.name || card.locator,
    }));
  const choices = [...own.filter(matches), ...listed].filter(
    (choice) => !chosen.includes(choice.callSign),
  );
  if (guest) {
    return (
      <GuestForm
        callSign={/\d/.test(search) && !isLocator(search) ? search.toUpperCase() : ''}
        onChoose={onChoose}
        onBack={() => setGuest(false)}
      />
    );
  }
  return (
    <>
      <TextField
        id={`${id}-search`}
        label="Call sign, name or locator"
        value={text}
        ref={field}
        autoComplete="off"
        spellCheck={false}
        maxLength={60}
        onChange={(event) => setText(event.target.value)}
        onKeyDown={(event) => {
          if (event.key !== 'Enter') return;
          event.preventDefault();
          if (isLocator(search)) onChoose(normalizeLocator(search));
          else if (choices[0]) onChoose(choices[0].callSign);
        }}
      />
      {isLocator(search) ? (
        <PlaceChoice locator={normalizeLocator(search)} onChoose={onChoose} />
      ) : null}
      <ul className="choices">
        {choices.map((choice) => (
          <li key={choice.id}>
            <button type="button" onClick={() => onChoose(choice.callSign)}>
              <strong>{choice.callSign}</strong>
              <span className="quiet">{choice.placeName}</span>
            </button>
          </li>
        ))}
      </ul>
      {choices.length === 0 && !isLocator(search) && !query.isFetching ? (
        <p className="field__note">
          {search === ''
            ? 'No station is listed yet. Type a locator such as JO97ee.'
            : 'No listed station matches. A locator such as JO97ee works too.'}
        </p>
      ) : null}
      <div>
        <Button look="bare" icon="plus" onClick={() => setGuest(true)}>
          Somebody not registered
        </Button>
      </div>
      {query.error ? <p className="field__error">{query.error.message}</p> : null}
      {onRemove ? (
        <Button look="bare" icon="trash" onClick={onRemove}>
          Leave {callSign} out
        </Button>
      ) : null}
    </>
  );
}

function PlaceChoice({
  locator,
  onChoose,
}: {
  locator: string;
  onChoose: (token: string) => void;
}) {
  const id = useId();
  const [zone, setZone] = useState('');
  const zones = Intl.supportedValuesOf('timeZone');
  const known = zone === '' || zones.includes(zone) || zone === 'UTC';
  return (
    <div className="stack">
      <TextField
        id={`${id}-zone`}
        label={`Time zone of ${locator}, if you know it`}
        list={`${id}-zones`}
        value={zone}
        autoComplete="off"
        onChange={(event) => setZone(event.target.value.trim())}
        error={known ? undefined : 'Choose a zone from the list, such as Europe/Stockholm.'}
      />
      <datalist id={`${id}-zones`}>
        {zones.map((name) => (
          <option key={name} value={name} />
        ))}
      </datalist>
      <div>
        <Button onClick={() => onChoose(known && zone !== '' ? `${locator}@${zone}` : locator)}>
          Use the place {locator}
        </Button>
      </div>
    </div>
  );
}
