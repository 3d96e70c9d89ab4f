import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { guestHours } from '../../domain/guest/guest';
import { bandById, type BandId } from '../../domain/station/bands';
import { defaultMode, MODES, type ModeId } from '../../domain/station/modes';
import { formatClock, formatLocalRange, formatUtcRange } from '../../domain/time/format';
import { MINUTE_MS, type Interval } from '../../domain/time/interval';
import { setupOn, type ChosenStation } from '../../domain/window/searchData';
import { listWords } from '../../domain/window/sentences';
import { paths } from '../../paths';
import { Button, ButtonLink } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { SelectField, TextAreaField, TextField } from '../ui/Field';
import { Cautions } from '../ui/Notices';
import { SlotFields } from './SlotFields';
import { ApiProblem, callApi } from './useWindows';

interface Props {
  slot: Interval;
  onSlot: (slot: Interval) => void;
  stations: ChosenStation[];
  band: BandId;
  /** Of the question, which the offer begins with. */
  mode: ModeId | null;
  signedIn: boolean;
  signInHref: string;
  nowMs: number;
  onOffered: (sked: { id: string; sentence: string; warnings: string[] }) => void;
}

/** Why no offer can be made from here, or null. */
function obstacle({ signedIn, stations, slot, nowMs }: Props): string | null {
  if (slot.startMs <= nowMs) return 'This time has passed.';
  if (!signedIn) return null;
  const places = stations.filter((station) => station.id === null && !station.guest);
  if (places.length > 0) {
    return `${listWords(places.map((place) => place.callSign))} ${places.length === 1 ? 'is a bare place' : 'are bare places'}. A sked needs a call sign: choose a station, or “Somebody not registered”.`;
  }
  if (!stations.some((station) => station.own)) {
    return 'An offer comes from one of your own stations. Put one into the question.';
  }
  return null;
}

/** The chosen slot, and the offer that can be made of it. */
export function OfferPanel(props: Props) {
  const { slot, onSlot, stations, signedIn, signInHref } = props;
  const [open, setOpen] = useState(false);
  const problem = obstacle(props);
  const from = stations.find((station) => station.own);
  const partners = stations.filter((station) => station !== from);
  const times = `${formatClock(slot.startMs)}–${formatClock(slot.endMs)}`;
  return (
    <div className="offer">
      <SlotFields slot={slot} onSlot={onSlot} />
      <p className="label">
        {stations
          .filter((station) => station.timeZone !== null)
          .map((station) => `${station.callSign} ${formatLocalRange(slot, station.timeZone!)}`)
          .join(' · ')}
      </p>
      <div className="row">
        {signedIn || problem !== null ? (
          <>
            <Button
              look="filled"
              large
              disabled={problem !== null}
              aria-describedby={problem ? 'offer-problem' : undefined}
              onClick={() => setOpen(true)}
            >
              Offer {times}
              {from ? ` to ${listWords(partners.map((station) => station.callSign))}` : ''}
            </Button>
            {problem ? (
              <p className="label" id="offer-problem">
                {problem}
              </p>
            ) : null}
          </>
        ) : (
          <>
            <ButtonLink look="filled" large href={signInHref}>
              Sign in to offer {times}
            </ButtonLink>
            <p className="label">Looking needs no account; an offer does.</p>
          </>
        )}
      </div>
      <Dialog
        open={open}
        title={`Offer ${formatUtcRange(slot)} to ${listWords(partners.map((station) => station.callSign))}?`}
        onClose={() => setOpen(false)}
      >
        {from ? (
          <OfferForm
            {...props}
            from={from}
            partners={partners}
            onCancel={() => setOpen(false)}
            onOffered={(sked) => {
              setOpen(false);
              props.onOffered(sked);
            }}
          />
        ) : null}
      </Dialog>
    </div>
  );
}

function OfferForm({
  slot,
  onSlot,
  stations,
  band,
  mode: asked,
  from,
  partners,
  onOffered,
  onCancel,
}: Props & { from: ChosenStation; partners: ChosenStation[]; onCancel: () => void }) {
  const { centreMhz, fromMhz, toMhz } = bandById(band);
  const ownStations = stations.filter((station) => station.own && station.id !== null);
  const [station, setStation] = useState(from.id!);
  const [frequency, setFrequency] = useState(centreMhz.toFixed(3));
  const [mode, setMode] = useState<ModeId>(asked ?? defaultMode(band));
  const [words, setWords] = useState('');
  const guests = stations.filter((partner) => partner.guest !== undefined);
  const [emails, setEmails] = useState<Record<string, string>>({});
  const frequencyMhz = Number(frequency.replace(',', '.'));
  const frequencyProblem =
    frequency.trim() !== '' && frequencyMhz >= fromMhz && frequencyMhz <= toMhz
      ? undefined
      : `The frequency must lie between ${fromMhz} and ${toMhz} MHz.`;
  const names = listWords(partners.map((partner) => partner.callSign));
  const offer = useMutation({
    mutationFn: () =>
      callApi<{ id: string; warnings?: string[] }>(paths.api.skeds, {
        method: 'POST',
        headers: { 'content-type': 'application/json' },
        body: JSON.stringify({
          station,
          with: stations.flatMap((partner): unknown[] => {
            if (partner.guest) return [guestToOffer(partner, emails[partner.token] ?? '', band)];
            return partner.id === null || partner.id === station ? [] : [partner.id];
          }),
          band,
          frequencyMhz,
          mode,
          start: new Date(slot.startMs).toISOString(),
          end: new Date(slot.endMs).toISOString(),
          words,
        }),
      }),
    onSuccess: ({ id, warnings = [] }) =>
      onOffered({
        id,
        warnings,
        sentence: `Offer sent to ${names}: ${formatUtcRange(slot)}.`,
      }),
  });
  const alternatives =
    offer.error instanceof ApiProblem ? (offer.error.body.alternatives ?? []) : [];
  return (
    <form
      className="stack"
      onSubmit={(event) => {
        event.preventDefault();
        if (frequencyProblem === undefined) offer.mutate();
      }}
    >
      {offer.error ? (
        <div className="notice notice--problem" role="alert">
          <p>{offer.error.message}</p>
          {alternatives.length > 0 ? (
            <>
              <p>Near it these are free:</p>
              <div className="row">
                {alternatives.map((other) => {
                  const interval = {
                    startMs: Date.parse(other.start),
                    endMs: Date.parse(other.end),
                  };
                  return (
                    <Button
                      key={other.start}
                      onClick={() => {
                        offer.reset();
                        onSlot(interval);
                      }}
                    >
                      {formatUtcRange(interval)}
                    </Button>
                  );
                })}
              </div>
            </>
          ) : null}
        </div>
      ) : null}
      {ownStations.length > 1 ? (
        <SelectField
          id="offer-station"
          label="On behalf of"
          value={station}
          onChange={(event) => setStation(event.target.value)}
        >
          {ownStations.map((own) => (
            <option key={own.id} value={own.id!}>
              {own.callSign}
            </option>
          ))}
        </SelectField>
      ) : null}
      {guests.map((guest, index) => (
        <TextField
          key={guest.token}
          id={`offer-email-${index}`}
          type="email"
          label={`Mail address of ${guest.callSign}`}
          note={`${guest.callSign} answers behind a link in a mail, without an account. The address is used for nothing else.`}
          autoComplete="off"
          required
          value={emails[guest.token] ?? ''}
          onChange={(event) => setEmails({ ...emails, [guest.token]: event.target.value })}
        />
      ))}
      <div className="form__pair">
        <TextField
          id="offer-frequency"
          label="Frequency, MHz"
          inputMode="decimal"
          value={frequency}
          error={frequencyProblem}
          onChange={(event) => setFrequency(event.target.value)}
        />
        <SelectField
          id="offer-mode"
          label="Mode"
          value={mode}
          onChange={(event) => setMode(event.target.value as ModeId)}
        >
          {MODES.map((option) => (
            <option key={option.id} value={option.id}>
              {option.label}
            </option>
          ))}
        </SelectField>
      </div>
      <TextAreaField
        id="offer-words"
        label={`Words for ${names}`}
        note="May stay empty. At most 500 characters."
        maxLength={500}
        value={words}
        onChange={(event) => setWords(event.target.value)}
      />
      <Cautions
        lowestElevationDeg={stations.find(({ id }) => id === station)?.sky.transmitElevationFromDeg}
      />
      <div className="row">
        <Button look="filled" large type="submit" disabled={offer.isPending}>
          {offer.isPending
            ? 'Sending the offer'
            : `Send the offer, ${Math.round((slot.endMs - slot.startMs) / MINUTE_MS)} min`}
        </Button>
        <Button onClick={onCancel}>Keep looking</Button>
      </div>
    </form>
  );
}

/** What the API is told of a partner without an account: as the windows were computed with it. */
function guestToOffer(partner: ChosenStation, email: string, band: BandId) {
  const { hours } = partner.guest!;
  const setup = setupOn(partner, band);
  return {
    callSign: partner.callSign,
    email,
    locator: partner.locator,
    timeZone: partner.timeZone,
    sky: partner.sky,
    hours: guestHours(hours),
    ...(setup ? { setup } : {}),
  };
}
