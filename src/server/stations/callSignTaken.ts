import type { Tx } from '../db/transaction';
import { Conflict } from '../errors';

/** Throws `Conflict` when another station has the call sign; one described only by others does not own it. */
export async function requireFreeCallSign(
  tx: Tx,
  callSign: string,
  exceptStationId?: string,
): Promise<void> {
  const other = await tx
    .selectFrom('station')
    .select('id')
    .where('call_sign', '=', callSign)
    .where('guest', '=', 0)
    .executeTakeFirst();
  if (other && other.id !== exceptStationId) {
    throw new CallSignTaken(callSign);
  }
}

export class CallSignTaken extends Conflict {
  constructor(callSign: string) {
    super(
      `${callSign} is already registered. Ask its keeper to invite you to the crew, or add a suffix such as ${callSign}/2.`,
    );
    this.fields.push({ path: 'callSign', message: `${callSign} is already registered.` });
  }
}
