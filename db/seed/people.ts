import type { CrewRole, Role } from '../../src/server/db/tables';

/** One invented person. Mail goes to `<key>@<domain of the crew>.example`, which no mail server serves. */
export interface DemoPerson {
  key: string;
  name: string;
  role: Role;
  timeZone: string;
  /** Stations by call sign; the first is the one the person is met at. */
  crews: Partial<Record<string, CrewRole>>;
}

export const DEMO_PEOPLE: readonly DemoPerson[] = [
  person('ylva', 'Ylva', 'Europe/Stockholm', { QA1LUN: 'keeper' }),
  person('tove', 'Tove', 'Europe/Stockholm', { QA1LUN: 'operator' }),
  person('edda', 'Edda', 'America/New_York', { QB7TID: 'keeper' }),
  person('marit', 'Marit', 'Europe/Berlin', { QK3OSL: 'keeper' }, 'coordinator'),
  person('keld', 'Keld', 'Europe/Berlin', { QK3OSL: 'operator' }),
  person('runa', 'Runa', 'Europe/Warsaw', { QE4MOR: 'keeper' }),
  person('osvin', 'Osvin', 'UTC', {}, 'administrator'),
  person('cedra', 'Cedra', 'Europe/Lisbon', { QI2CED: 'keeper' }),
  person('rico', 'Rico', 'America/Sao_Paulo', { QL1RIC: 'keeper' }),
  person('stelan', 'Stelan', 'America/Denver', { QP4STE: 'keeper' }),
  person('farran', 'Farran', 'Europe/London', { QC2FAR: 'keeper' }),
  person('aldo', 'Aldo', 'America/Chicago', { QD5ALD: 'keeper' }),
  person('wenna', 'Wenna', 'America/Chicago', { QD5ALD: 'operator' }),
  person('brask', 'Brask', 'America/Chicago', { QD5ALD: 'operator' }),
  person('gamini', 'Gamini', 'Asia/Kolkata', { QF6GAM: 'keeper' }),
  person('pelle', 'Pelle', 'Europe/Helsinki', { QG8PEL: 'keeper' }),
  person('vorna', 'Vorna', 'Africa/Johannesburg', { QH3VOR: 'keeper' }),
  person('nimue', 'Nimue', 'Asia/Tokyo', { QJ4NIM: 'keeper' }),
  person('hoshiro', 'Hoshiro', 'Asia/Tokyo', { QJ4NIM: 'operator' }),
  person('sanna', 'Sanna', 'Australia/Adelaide', { QM2SAN: 'keeper' }),
  person('wexel', 'Wexel', 'America/St_Johns', { QN9WEX: 'keeper' }),
  person('brana', 'Brana', 'Pacific/Auckland', { QO1BRA: 'keeper' }),
  person('kelda', 'Kelda', 'America/Los_Angeles', { QR5KEL: 'keeper' }),
  person('dunya', 'Dunya', 'Asia/Almaty', { QS7DUN: 'keeper' }),
  person('zephan', 'Zephan', 'Asia/Kathmandu', { QT2ZEP: 'keeper' }),
  person('livia', 'Livia', 'America/Argentina/Buenos_Aires', { QU6LIV: 'keeper' }),
  person('haldor', 'Haldor', 'Atlantic/Reykjavik', { QV3HAL: 'keeper' }),
  person('mirko', 'Mirko', 'Australia/Perth', { QW8MIR: 'keeper' }),
  person('torvi', 'Torvi', 'America/Halifax', { QX4TOR: 'keeper' }),
  person('fenna', 'Fenna', 'Europe/Amsterdam', { QY1FEN: 'keeper', QK3OSL: 'operator' }),
  person('orba', 'Orba', 'Africa/Nairobi', { QZ5ORB: 'keeper' }),
  person('kari', 'Kari', 'Australia/Lord_Howe', { QE9KAR: 'keeper' }),
];

function person(
  key: string,
  name: string,
  timeZone: string,
  crews: DemoPerson['crews'],
  role: Role = 'operator',
): DemoPerson {
  return { key, name, role, timeZone, crews };
}

/** Mail address of a demo person: at the station they keep, else at the demo's own house. */
export function demoMail({ key, crews }: DemoPerson): string {
  const house = Object.keys(crews)[0] ?? 'echotide';
  return `${key}@${house.toLowerCase()}.example`;
}
