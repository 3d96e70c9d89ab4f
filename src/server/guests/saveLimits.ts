import { z } from 'zod';
import { dailyHours, guestHours } from '../../domain/guest/guest';
import { locatorToPosition } from '../../domain/locator/locator';
import { locatorSchema, skyLimitsSchema, timeZoneSchema } from '../../domain/station/schema';
import { inTransaction } from '../db/transaction';
import { NotFound } from '../errors';
import { nameField } from '../people/fields';
import type { Services } from '../services';
import { hoursOf, skyOf } from '../stations/records';
import { clockField, degreesField, skyRanges } from './formFields';
import { freshLink, useLink } from './guestLink';

/** The form in which somebody without an account says what their station can do. */
export const limitsSchema = z
  .object({
    /** May stay empty. */
    name: z
      .string()
      .default('')
      .transform((text, context): string => {
        if (text.trim() === '') return '';
        const name = nameField.safeParse(text);
        for (const { message } of name.error?.issues ?? []) {
          context.addIssue({ code: 'custom', message });
        }
        return name.data ?? '';
      }),
    locator: locatorSchema,
    timeZone: timeZoneSchema,
    elevationFrom: degreesField('Lowest elevation', 0, 89),
    elevationTo: degreesField('Highest elevation', 1, 90),
    azimuthFrom: degreesField('Azimuth from', 0, 360),
    azimuthTo: degreesField('Azimuth to', 0, 360),
    hoursFrom: clockField('From', 23),
    hoursTo: clockField('To', 24),
  })
  .transform(({ hoursFrom, hoursTo, ...fields }, context) => {
    const sky = skyLimitsSchema.safeParse(skyRanges(fields));
    for (const { path, message } of sky.error?.issues ?? []) {
      const field = String(path[0] ?? '').replace(/Deg$/, '');
      context.addIssue({ code: 'custom', path: [field], message });
    }
    if (!sky.success) return z.NEVER;
    const { name, locator, timeZone } = fields;
    return { name, locator, timeZone, sky: sky.data, hours: { from: hoursFrom, to: hoursTo } };
  });

export type Limits = z.output<typeof limitsSchema>;

/**
 * Corrects what others assumed of the station of the person behind the link; a registered station is changed on its own
 * pages. Uses the link up; returns the path of the next. Throws as `requireUsableLink`.
 */
export async function saveLimits(
  services: Services,
  secret: string,
  limits: Limits,
): Promise<string> {
  const link = await inTransaction(services.db, async (tx) => {
    const used = await useLink(tx, services, secret);
    const station = await tx
      .selectFrom('station')
      .innerJoin('sked_party', 'sked_party.station_id', 'station.id')
      .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
      .selectAll('station')
      .where('sked_party.sked_id', '=', used.skedId)
      .where('station_crew.person_id', '=', used.person.id)
      .where('station.guest', '=', 1)
      .orderBy('sked_party.place')
      .executeTakeFirst();
    if (!station) {
      throw new NotFound('Your station is registered here. Sign in to change its limits.');
    }
    const moved = limits.locator !== station.locator;
    const { latitudeDeg, longitudeDeg } = locatorToPosition(limits.locator);
    const before = hoursOf(station);
    const daily = dailyHours(before);
    const sameHours = daily?.from === limits.hours.from && daily.to === limits.hours.to;
    // A horizon or blocked sectors that came by the API stay; only the ranges of the form are replaced.
    const { blocked, horizon } = skyOf(station);
    await tx
      .updateTable('station')
      .set({
        time_zone: limits.timeZone,
        sky_json: JSON.stringify({
          ...limits.sky,
          ...(blocked ? { blocked } : {}),
          ...(horizon ? { horizon } : {}),
        }),
        hours_json: JSON.stringify(sameHours ? before : guestHours(limits.hours)),
        version: station.version + 1,
        updated_at: services.now(),
        ...(moved
          ? {
              locator: limits.locator,
              latitude_deg: latitudeDeg,
              longitude_deg: longitudeDeg,
              public_locator_length: Math.min(limits.locator.length, 6) as 4 | 6,
            }
          : {}),
      })
      .where('id', '=', station.id)
      .execute();
    if (used.person.confirmed_at === null) {
      await tx
        .updateTable('person')
        .set({ name: limits.name || station.call_sign, time_zone: limits.timeZone })
        .where('id', '=', used.person.id)
        .execute();
    }
    return used;
  });
  return freshLink(services, link);
}
