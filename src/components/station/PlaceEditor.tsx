import { useState } from 'react';
import {
  isLocator,
  LocatorError,
  locatorToPosition,
  positionToLocator,
} from '../../domain/locator/locator';
import {
  newStationSchema,
  placeUpdateSchema,
  type PublicLocatorLength,
} from '../../domain/station/schema';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { TextField } from '../ui/Field';
import { IslandForm } from '../ui/IslandForm';
import { ProblemSummary } from '../ui/Notices';
import { Toast } from '../ui/Toast';
import { FigureField } from './FigureField';
import { PublicLocator } from './PublicLocator';
import { ZoneField } from './ZoneField';
import { fieldId, useSave, useUnsavedWarning } from './useSave';

export interface PlaceDraft {
  callSign: string;
  name: string;
  locator: string;
  latitudeDeg: number | undefined;
  longitudeDeg: number | undefined;
  heightM: number | undefined;
  timeZone: string;
  publicLocatorLength: PublicLocatorLength;
}

interface Props {
  /** Absent: a new station. */
  station?: { id: string; version: number } | undefined;
  draft: PlaceDraft;
  zones: string[];
  nowMs: number;
}

/** Where a station is. Locator and coordinates follow each other; what was typed last counts. */
export function PlaceEditor({ station, draft: first, zones, nowMs }: Props) {
  const [draft, setDraft] = useState(first);
  const [typedLast, setTypedLast] = useState<'locator' | 'coordinates'>(() => origin(first));
  const [version, setVersion] = useState(station?.version ?? 0);
  const [unsaved, setUnsaved] = useState(false);
  const [leaving, setLeaving] = useState(false);
  const [saved, setSaved] = useState(false);
  const { save, saving, problems, errorOf } = useSave<{ id: string; version: number }>(
    station ? 'PUT' : 'POST',
    station ? paths.api.stationPlace(station.id) : paths.api.stations,
    station ? placeUpdateSchema : newStationSchema,
  );
  useUnsavedWarning(unsaved && !leaving);

  const change = (part: Partial<PlaceDraft>) => {
    setDraft((before) => ({ ...before, ...part }));
    setUnsaved(true);
  };
  const changeLocator = (locator: string) => {
    setTypedLast('locator');
    const centre = isLocator(locator) ? locatorToPosition(locator) : null;
    change({
      locator,
      latitudeDeg: centre ? rounded(centre.latitudeDeg) : undefined,
      longitudeDeg: centre ? rounded(centre.longitudeDeg) : undefined,
    });
  };
  const changeCoordinates = (part: Partial<PlaceDraft>) => {
    setTypedLast('coordinates');
    const { latitudeDeg, longitudeDeg } = { ...draft, ...part };
    change({ ...part, locator: locatorOf(latitudeDeg, longitudeDeg) ?? '' });
  };

  const submit = async () => {
    const { callSign, name, locator, latitudeDeg, longitudeDeg, heightM, timeZone } = draft;
    const where = typedLast === 'locator' ? { locator } : { latitudeDeg, longitudeDeg };
    const answer = await save({
      callSign,
      name,
      ...where,
      heightM,
      timeZone,
      publicLocatorLength: draft.publicLocatorLength,
      ...(station ? { version } : {}),
    });
    if (!answer) return;
    setUnsaved(false);
    if (station) {
      setVersion(answer.version);
      setSaved(true);
    } else {
      setLeaving(true);
      window.location.assign(`${paths.stationSky(answer.id)}?new`);
    }
  };

  return (
    <IslandForm
      noValidate
      className="stack"
      onSubmit={(event) => {
        event.preventDefault();
        void submit();
      }}
    >
      <ProblemSummary problems={problems} />
      <div className="columns columns--detail">
        <div className="stack">
          <div className="form__pair">
            <TextField
              id={fieldId('callSign')}
              label="Call sign"
              autoComplete="off"
              autoCapitalize="characters"
              spellCheck={false}
              value={draft.callSign}
              onChange={(event) => change({ callSign: event.target.value })}
              error={errorOf('callSign')}
            />
            <TextField
              id={fieldId('name')}
              label="Name of the place"
              note="As others read it beside the call sign, such as Baltic coast."
              value={draft.name}
              onChange={(event) => change({ name: event.target.value })}
              error={errorOf('name')}
            />
          </div>
          <fieldset className="group ruled stack">
            <legend className="sr-only">Position</legend>
            <p>Give the locator or the coordinates. The other one follows.</p>
            <TextField
              id={fieldId('locator')}
              label="Locator"
              autoComplete="off"
              spellCheck={false}
              value={draft.locator}
              onChange={(event) => changeLocator(event.target.value)}
              note={errorOf('locator') ? undefined : locatorNote(draft.locator, typedLast)}
              error={errorOf('locator')}
            />
            <div className="form__pair">
              <FigureField
                id={fieldId('latitudeDeg')}
                label="Latitude, ° (south negative)"
                value={draft.latitudeDeg}
                onChange={(latitudeDeg) => changeCoordinates({ latitudeDeg })}
                error={errorOf('latitudeDeg')}
              />
              <FigureField
                id={fieldId('longitudeDeg')}
                label="Longitude, ° (west negative)"
                value={draft.longitudeDeg}
                onChange={(longitudeDeg) => changeCoordinates({ longitudeDeg })}
                error={errorOf('longitudeDeg')}
              />
              <FigureField
                id={fieldId('heightM')}
                label="Height, m"
                note="Over the sea; a few metres more or less do not matter."
                value={draft.heightM}
                onChange={(heightM) => change({ heightM })}
                error={errorOf('heightM')}
              />
              <ZoneField
                value={draft.timeZone}
                zones={zones}
                nowMs={nowMs}
                onChange={(timeZone) => change({ timeZone })}
                error={errorOf('timeZone')}
              />
            </div>
          </fieldset>
        </div>
        <PublicLocator
          locator={draft.locator}
          length={draft.publicLocatorLength}
          onChange={(publicLocatorLength) => change({ publicLocatorLength })}
        />
      </div>
      <div className="row ruled">
        <Button type="submit" look="filled" large disabled={saving || leaving}>
          {saving || leaving ? 'Saving' : station ? 'Save the place' : 'Save and go on to the sky'}
        </Button>
        {unsaved && !saving && !leaving ? <span className="quiet">Not saved yet.</span> : null}
        {saved ? <Toast message="The place is saved." onDone={() => setSaved(false)} /> : null}
      </div>
    </IslandForm>
  );
}

function rounded(degrees: number): number {
  return Math.round(degrees * 1e5) / 1e5;
}

function origin({ locator, latitudeDeg, longitudeDeg }: PlaceDraft): 'locator' | 'coordinates' {
  if (!isLocator(locator) || latitudeDeg === undefined || longitudeDeg === undefined) {
    return 'locator';
  }
  const centre = locatorToPosition(locator);
  const near = (a: number, b: number) => Math.abs(a - b) < 1e-5;
  return near(centre.latitudeDeg, latitudeDeg) && near(centre.longitudeDeg, longitudeDeg)
    ? 'locator'
    : 'coordinates';
}

function locatorOf(latitudeDeg: number | undefined, longitudeDeg: number | undefined) {
  if (latitudeDeg === undefined || longitudeDeg === undefined) return null;
  try {
    return positionToLocator({ latitudeDeg, longitudeDeg }, 10);
  } catch {
    return null;
  }
}

/** What is wrong with a locator while it is typed, or that the middle of its cell is taken. */
function locatorNote(locator: string, typedLast: 'locator' | 'coordinates'): string {
  if (locator.trim() === '') return '4, 6, 8 or 10 characters, such as JO97ee.';
  try {
    locatorToPosition(locator);
  } catch (error) {
    if (error instanceof LocatorError) return error.message;
  }
  return typedLast === 'locator'
    ? 'The middle of its cell is taken.'
    : 'Found from the coordinates.';
}
