import { remindDueRosters } from '../activities/remindRoster';
import { workPlanRuns } from '../activities/workPlanRuns';
import { sendDigests } from '../digest/sendDigests';
import { readInboundFolder } from '../inbound/readInboundFolder';
import { deliverDue } from '../mail/deliver';
import { limitWaits } from '../mail/limitWaits';
import { smtpTransport } from '../mail/transport';
import { keepReminders } from '../reminders/keepReminders';
import { queueReminders } from '../reminders/queueReminders';
import type { Services } from '../services';
import { lapseDueSkeds } from '../skeds/lapseDueSkeds';
import { beat } from './heartbeat';
import { removeOldTokens } from './removeOldTokens';
import type { Job } from './runner';

const SECOND_MS = 1000;
const HOUR_MS = 3600 * SECOND_MS;
/** Each carrier brings one mail at a time, so that a mail server that hangs holds up only one of them. */
const CARRIERS = 4;

/** Everything the background worker does, each on its own rhythm. */
export function jobsOf(services: Services): Job[] {
  const delivery = {
    send: smtpTransport(services.config),
    leaseMs: services.config.mailLeaseMs,
    atOnce: 1,
  };
  const carriers = Array.from({ length: CARRIERS }, (_, place) => ({
    name: `deliver mail ${place + 1}`,
    everyMs: SECOND_MS,
    run: async () => (await deliverDue(services, delivery)) > 0,
  }));
  return [
    ...carriers,
    {
      name: 'limit waits after a clock step',
      everyMs: SECOND_MS,
      run: async () => {
        await limitWaits(services);
        return false;
      },
    },
    {
      name: 'lapse offers whose time came',
      everyMs: 15 * SECOND_MS,
      run: async () => {
        await lapseDueSkeds(services);
        return false;
      },
    },
    ...(services.config.inbound.folder === null
      ? []
      : [
          {
            name: 'read mails that came in',
            everyMs: 5 * SECOND_MS,
            run: async () => (await readInboundFolder(services)) > 0,
          },
        ]),
    {
      name: 'keep reminders',
      everyMs: 20 * SECOND_MS,
      run: async () => {
        await keepReminders(services);
        return false;
      },
    },
    {
      name: 'queue reminders',
      everyMs: 5 * SECOND_MS,
      run: async () => (await queueReminders(services)) > 0,
    },
    {
      name: 'send digests',
      everyMs: 60 * SECOND_MS,
      run: async () => {
        await sendDigests(services);
        return false;
      },
    },
    {
      name: 'compute plans',
      everyMs: SECOND_MS,
      run: () => workPlanRuns(services),
    },
    {
      name: 'remind rosters before answers are due',
      everyMs: 60 * SECOND_MS,
      run: async () => {
        await remindDueRosters(services);
        return false;
      },
    },
    {
      name: 'remove old tokens',
      everyMs: HOUR_MS,
      run: async () => {
        await removeOldTokens(services);
        return false;
      },
    },
    {
      name: 'heartbeat',
      everyMs: 10 * SECOND_MS,
      run: async () => {
        await beat(services);
        return false;
      },
    },
  ];
}
