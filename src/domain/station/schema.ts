import { z } from 'zod';
import {
  LocatorError,
  locatorToPosition,
  normalizeLocator,
  positionToLocator,
} from '../locator/locator';
import { isTimeZone } from '../time/format';
import { callSignSchema } from './callSign';
import { equipmentSchema } from './equipmentSchema';
import { figure, record, versionSchema, words } from './fields';
import { stationHoursSchema } from './hoursSchema';
import { skyLimitsSchema } from './skySchema';

export { callSignSchema } from './callSign';
export { bandSetupSchema, equipmentSchema } from './equipmentSchema';
export { stationHoursSchema, type StationHours } from './hoursSchema';
export { skyLimitsSchema } from './skySchema';

export const timeZoneSchema = words('The time zone', 64, 1).refine(
  isTimeZone,
  'That is not a known time zone. Zones are named such as Europe/Stockholm.',
);

/** How much of the locator others see. Windows cannot be computed from less than four characters. */
export const PUBLIC_LOCATOR_LENGTHS = [4, 6, 8, 10] as const;
export type PublicLocatorLength = (typeof PUBLIC_LOCATOR_LENGTHS)[number];

export const publicLocatorLengthSchema = z.literal(PUBLIC_LOCATOR_LENGTHS, {
  error: 'Others can see 4, 6, 8 or 10 characters of the locator.',
});

export const locatorSchema = z
  .string({ error: 'A locator must be text.' })
  .transform((text, context) => {
    try {
      return normalizeLocator(text);
    } catch (error) {
      if (!(error instanceof LocatorError)) throw error;
      context.addIssue({ code: 'custom', message: error.message });
      return z.NEVER;
    }
  });

const placeFields = {
  locator: locatorSchema.optional(),
  latitudeDeg: figure('Latitude', -90, 90, '°').optional(),
  longitudeDeg: figure('Longitude', -180, 180, '°').optional(),
  heightM: figure('Height', -450, 9000, 'm'),
  timeZone: timeZoneSchema,
  publicLocatorLength: publicLocatorLengthSchema,
};

interface PlaceFields {
  locator?: string | undefined;
  latitudeDeg?: number | undefined;
  longitudeDeg?: number | undefined;
}

/** Where a station is: of the locator and the coordinates, the other one is filled in. */
function located<T extends PlaceFields>(fields: T, context: z.RefinementCtx) {
  const { locator, latitudeDeg, longitudeDeg, ...others } = fields;
  const problem = (path: string, message: string) => {
    context.addIssue({ code: 'custom', path: [path], message });
    return z.NEVER;
  };
  if (latitudeDeg === undefined && longitudeDeg === undefined) {
    if (locator === undefined) return problem('locator', 'Give a locator or coordinates.');
    const centre = locatorToPosition(locator);
    return {
      ...others,
      locator,
      latitudeDeg: centre.latitudeDeg,
      longitudeDeg: centre.longitudeDeg,
    };
  }
  if (latitudeDeg === undefined) return problem('latitudeDeg', 'Latitude is missing.');
  if (longitudeDeg === undefined) return problem('longitudeDeg', 'Longitude is missing.');
  const found = positionToLocator({ latitudeDeg, longitudeDeg }, 10);
  if (locator !== undefined && !found.startsWith(locator)) {
    return problem(
      'locator',
      `The coordinates lie in ${found.slice(0, locator.length)}, not in ${locator}.`,
    );
  }
  return { ...others, locator: found, latitudeDeg, longitudeDeg };
}

const identityFields = {
  callSign: callSignSchema,
  name: words('The name', 60, 1),
};

export const newStationSchema = record({ ...identityFields, ...placeFields }).transform(located);

export const placeUpdateSchema = record({
  version: versionSchema,
  ...identityFields,
  ...placeFields,
}).transform(located);

export const skyUpdateSchema = record({ version: versionSchema, sky: skyLimitsSchema });

export const equipmentUpdateSchema = record({ version: versionSchema, equipment: equipmentSchema });

export const hoursUpdateSchema = record({ version: versionSchema, hours: stationHoursSchema });

export const profileUpdateSchema = record({
  version: versionSchema,
  note: words('The note', 2000),
  listed: z.boolean({ error: 'Listed must be yes or no.' }),
});

export const crewInvitationSchema = record({
  email: words('The mail address', 254, 1)
    .toLowerCase()
    .pipe(z.email('That is not a mail address.')),
  crewRole: z.enum(['keeper', 'operator'], { error: 'A crew member is a keeper or an operator.' }),
});

export const crewRoleSchema = crewInvitationSchema.pick({ crewRole: true });

export type NewStation = z.output<typeof newStationSchema>;
export type PlaceUpdate = z.output<typeof placeUpdateSchema>;
export type SkyUpdate = z.output<typeof skyUpdateSchema>;
export type EquipmentUpdate = z.output<typeof equipmentUpdateSchema>;
export type HoursUpdate = z.output<typeof hoursUpdateSchema>;
export type ProfileUpdate = z.output<typeof profileUpdateSchema>;
export type CrewInvitation = z.output<typeof crewInvitationSchema>;
export type CrewRoleChange = z.output<typeof crewRoleSchema>;
