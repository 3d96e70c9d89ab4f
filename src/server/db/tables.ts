import type { Generated, Insertable, Selectable } from 'kysely';
import type { BandId } from '../../domain/station/bands';
import type { ModeId } from '../../domain/station/modes';
import type { FluxAt, NoiseMethod } from '../../domain/station/noiseRecord';
import type { SkedEventKind, SkedResult, SkedState } from '../../domain/sked/types';

export type Role = 'operator' | 'coordinator' | 'administrator';
export type CrewRole = 'keeper' | 'operator';
export type TokenPurpose = 'confirmMail' | 'signIn' | 'resetPassword';

export interface PersonTable {
  id: string;
  email: string;
  name: string;
  password_hash: string | null;
  role: Role;
  time_zone: string;
  confirmed_at: number | null;
  locked_at: number | null;
  sessions_valid_from: number;
  created_at: number;
}

export interface PersonTokenTable {
  id: string;
  person_id: string;
  purpose: TokenPurpose;
  token_hash: string;
  created_at: number;
  expires_at: number;
  used_at: number | null;
}

export interface StationTable {
  id: string;
  call_sign: string;
  name: string;
  latitude_deg: number;
  longitude_deg: number;
  height_m: number;
  locator: string;
  public_locator_length: 2 | 4 | 6 | 8 | 10;
  time_zone: string;
  sky_json: string;
  hours_json: string;
  listed: Generated<0 | 1>;
  note: Generated<string>;
  version: Generated<number>;
  created_at: number;
  updated_at: number;
}

export interface StationBandTable {
  station_id: string;
  band: BandId;
  setup_json: string;
}

export interface NoiseRecordTable {
  id: string;
  station_id: string;
  band: BandId;
  /** Day in UTC, "2027-01-18". */
  measured_on: string;
  method: NoiseMethod;
  y_db: number;
  hot_k: number | null;
  cold_k: number | null;
  flux_sfu: number | null;
  flux_at: FluxAt | null;
  gain_dbi: number | null;
  beamwidth_deg: number | null;
  note: Generated<string>;
  recorded_by: string | null;
  created_at: number;
}

export interface StationCrewTable {
  station_id: string;
  person_id: string;
  crew_role: CrewRole;
  added_at: number;
}

export interface CrewInvitationTable {
  id: string;
  station_id: string;
  email: string;
  crew_role: CrewRole;
  token_hash: string;
  invited_by: string;
  created_at: number;
  expires_at: number;
  accepted_at: number | null;
}

export interface SkedTable {
  id: string;
  uid: string;
  sequence: Generated<number>;
  band: BandId;
  frequency_mhz: number;
  mode: ModeId;
  state: SkedState;
  version: Generated<number>;
  /** Station whose offer the slot is. */
  offered_by: string;
  start_at: number;
  end_at: number;
  created_at: number;
  updated_at: number;
}

export interface SkedPartyTable {
  sked_id: string;
  station_id: string;
  place: number;
  answer: 'waiting' | 'accepted' | 'declined';
}

export interface SkedEventTable {
  id: string;
  sked_id: string;
  sked_version: number;
  kind: SkedEventKind;
  station_id: string | null;
  person_id: string | null;
  start_at: number;
  end_at: number;
  words: Generated<string>;
  at: number;
}

export interface SkedReportTable {
  sked_id: string;
  station_id: string;
  person_id: string;
  result: SkedResult;
  words: Generated<string>;
  at: number;
}

export interface BookingTable {
  station_id: string;
  sked_id: string;
  start_at: number;
  end_at: number;
}

export interface OutboxTable {
  id: string;
  message_id: string;
  recipient: string;
  subject: string;
  text_body: string;
  html_body: string;
  calendar_method: 'REQUEST' | 'CANCEL' | null;
  calendar_body: string | null;
  created_at: number;
  next_attempt_at: number;
  attempts: Generated<number>;
  leased_until: number | null;
  sent_at: number | null;
  set_aside_at: number | null;
  last_error: string | null;
}

export interface AuditTable {
  id: Generated<number>;
  at: number;
  person_id: string | null;
  action: string;
  subject: string;
  details_json: Generated<string>;
}

export interface InstallationTable {
  name: string;
  value: string;
}

export interface Tables {
  person: PersonTable;
  person_token: PersonTokenTable;
  station: StationTable;
  station_band: StationBandTable;
  noise_record: NoiseRecordTable;
  station_crew: StationCrewTable;
  crew_invitation: CrewInvitationTable;
  sked: SkedTable;
  sked_party: SkedPartyTable;
  sked_event: SkedEventTable;
  sked_report: SkedReportTable;
  booking: BookingTable;
  outbox: OutboxTable;
  audit: AuditTable;
  installation: InstallationTable;
}

export type PersonRow = Selectable<PersonTable>;
export type StationRow = Selectable<StationTable>;
export type NoiseRecordRow = Selectable<NoiseRecordTable>;
export type SkedRow = Selectable<SkedTable>;
export type SkedPartyRow = Selectable<SkedPartyTable>;
export type SkedEventRow = Selectable<SkedEventTable>;
export type OutboxRow = Selectable<OutboxTable>;
export type NewOutboxRow = Insertable<OutboxTable>;
