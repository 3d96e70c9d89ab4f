import { type z } from 'zod';
import { GUEST_DEFAULTS, guestHours, guestZone } from '../../domain/guest/guest';
import { locatorToPosition } from '../../domain/locator/locator';
import { record } from '../../domain/station/fields';
import {
  bandSetupSchema,
  callSignSchema,
  locatorSchema,
  skyLimitsSchema,
  stationHoursSchema,
  timeZoneSchema,
} from '../../domain/station/schema';
import { emailField } from '../people/fields';

/** A partner without an account, as the API takes it; what is missing is filled in from `GUEST_DEFAULTS`. */
export const guestSchema = record(
  {
    callSign: callSignSchema,
    email: emailField,
    locator: locatorSchema,
    timeZone: timeZoneSchema.optional(),
    sky: skyLimitsSchema.optional(),
    hours: stationHoursSchema.optional(),
    setup: bandSetupSchema.optional(),
  },
  'A partner without an account',
).transform(({ sky, hours, ...guest }) => {
  const { latitudeDeg, longitudeDeg } = locatorToPosition(guest.locator);
  return {
    ...guest,
    latitudeDeg,
    longitudeDeg,
    timeZone: guestZone(guest),
    sky: sky ?? { elevationFromDeg: GUEST_DEFAULTS.elevationFromDeg },
    hours: hours ?? guestHours(),
  };
});

/** Somebody without an account to whom a sked is offered. */
export type Guest = z.output<typeof guestSchema>;
