import { z } from 'zod';
import { GUEST_DEFAULTS, guestHours } from '../../domain/guest/guest';
import { slotOfFields } from '../../domain/sked/moveChoice';
import { BAND_IDS } from '../../domain/station/bands';
import { MODE_IDS } from '../../domain/station/modes';
import { stationIdSchema, wordsSchema } from '../skeds/schemas';
import { clockField, degreesField, numberField, skyRanges } from './formFields';
import { guestSchema } from './guestSchema';

const text = z.string().default('');

/** The offer to somebody without an account as one plain form; what stays empty is assumed. */
export const guestOfferFormSchema = z
  .object({
    station: stationIdSchema,
    callSign: text,
    email: text,
    locator: text,
    timeZone: text,
    elevationFrom: degreesField('Lowest elevation', 0, 89),
    elevationTo: degreesField('Highest elevation', 1, 90),
    azimuthFrom: degreesField('Azimuth from', 0, 360),
    azimuthTo: degreesField('Azimuth to', 0, 360),
    hoursFrom: clockField('From', 23),
    hoursTo: clockField('To', 24),
    band: z.enum(BAND_IDS, 'Choose one of the bands.'),
    frequency: numberField('The frequency', 50, 47_200, 'MHz'),
    mode: z.enum(MODE_IDS, 'Choose one of the modes.'),
    date: text,
    time: text,
    minutes: text,
    words: wordsSchema,
  })
  .transform((form, context) => {
    const { date, time, minutes } = form;
    const ranges = skyRanges(form);
    const guest = guestSchema.safeParse({
      callSign: form.callSign,
      email: form.email,
      locator: form.locator,
      ...(form.timeZone === '' ? {} : { timeZone: form.timeZone }),
      sky: { elevationFromDeg: GUEST_DEFAULTS.elevationFromDeg, ...ranges },
      hours: guestHours({ from: form.hoursFrom, to: form.hoursTo }),
    });
    for (const { path, message } of guest.error?.issues ?? []) {
      const field = String(path.at(-1) ?? '').replace(/Deg$/, '');
      context.addIssue({ code: 'custom', path: [field], message });
    }
    const slot = slotOfFields({ date, time, minutes });
    if (!slot) {
      context.addIssue({
        code: 'custom',
        path: ['date'],
        message:
          'Give the day as 2027-01-20, the start as 22:00 in UTC, and the length in minutes.',
      });
    }
    if (!guest.success || !slot) return z.NEVER;
    return {
      station: form.station,
      with: [guest.data],
      band: form.band,
      ...(form.frequency === undefined ? {} : { frequencyMhz: form.frequency }),
      mode: form.mode,
      start: slot.startMs,
      end: slot.endMs,
      words: form.words,
    };
  });
