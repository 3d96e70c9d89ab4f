import { calendarOf } from '../../domain/sked/standing';
import type { Interval } from '../../domain/time/interval';
import { paths } from '../../paths';
import type { Tx } from '../db/transaction';
import { Conflict, type AppError } from '../errors';
import { skedAnswerMail } from '../mail/templates/skedAnswerMail';
import { skedFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { loadSked } from '../skeds/load';
import { personalEntry } from '../skeds/notify';
import { sendSkedMail } from '../skeds/sendSkedMail';
import type { Answerer } from './whoAnswers';

/**
 * The one mail that an answer may get back, when it changed nothing. With `corrects` it carries the entry as it stands,
 * because the calendar program of the person shows what was answered.
 */
export async function mailBack(
  tx: Tx,
  services: Services,
  {
    loaded: {
      row: { id },
    },
    person,
    stationIds,
  }: Answerer,
  why: { sentences: string[]; alternatives?: Interval[]; corrects: boolean },
): Promise<void> {
  const { row, sked, stations } = (await loadSked(tx, id))!;
  const facts = skedFacts(row, stations, sked, services.config.publicUrl + paths.sked(row.id));
  const mail = skedAnswerMail(facts, person, { alternatives: [], ...why });
  await sendSkedMail(tx, services, {
    sked: row,
    facts,
    recipient: person,
    ...mail,
    ...(why.corrects
      ? { entry: personalEntry(sked, calendarOf(sked), stationIds, services.now()) }
      : {}),
  });
}

/** The slots that a refusal offers instead. */
export function alternativesOf(error: AppError): Interval[] {
  const given = error instanceof Conflict ? error.details['alternatives'] : undefined;
  return ((given ?? []) as { start: string; end: string }[]).map(({ start, end }) => ({
    startMs: Date.parse(start),
    endMs: Date.parse(end),
  }));
}
