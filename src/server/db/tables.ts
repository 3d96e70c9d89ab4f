import type { Generated, Selectable } from 'kysely';
import type { DialConvention } from '../../domain/link/doppler';
import type { BandId } from '../../domain/station/bands';
import type { ModeId } from '../../domain/station/modes';
import type { FluxAt, NoiseMethod } from '../../domain/station/noiseRecord';
import type { SkedEventKind, SkedResult, SkedState } from '../../domain/sked/types';

export type Role = 'operator' | 'coordinator' | 'administrator';
/** PUBLISH: the entries of a whole plan in one mail. */
export type CalendarMethod = 'REQUEST' | 'CANCEL' | 'PUBLISH';
/** What a mail is about: what a person can switch off, and what not. */
export type MailTopic = 'account' | 'sked' | 'reminder' | 'digest' | 'talk' | 'activity';
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
  /** Name and time zone typed on registering, until the address is confirmed. */
  registration_json: Generated<string | null>;
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
  /** Described by somebody who offered it a sked; its keeper has no confirmed account. */
  guest: Generated<0 | 1>;
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
  /** Whether the eastern station, counted from the date line, transmits first. */
  east_first: Generated<0 | 1>;
  doppler_convention: Generated<DialConvention>;
  /** Version at which the slot was agreed; null while it is not. */
  agreed_version: Generated<number | null>;
  activity_id: Generated<string | null>;
}

export interface SkedPartyTable {
  sked_id: string;
  station_id: string;
  place: number;
  answer: 'waiting' | 'accepted' | 'declined';
  /** Since when the station has no part in it any more. */
  left_at: Generated<number | null>;
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
  /** SEQUENCE of the newest calendar message after it. */
  sequence: Generated<number>;
}

export interface SkedReportTable {
  sked_id: string;
  station_id: string;
  person_id: string;
  result: SkedResult;
  words: Generated<string>;
  at: number;
  report_sent: Generated<string>;
  report_received: Generated<string>;
}

export interface SkedMessageTable {
  id: string;
  sked_id: string;
  station_id: string;
  person_id: string;
  words: string;
  at: number;
}

/** The link in a mail to somebody without an account, for one sked or one activity. */
export interface GuestLinkTable {
  id: string;
  token_hash: string;
  person_id: string;
  sked_id: string | null;
  activity_id: Generated<string | null>;
  created_at: number;
  expires_at: number;
  used_at: number | null;
}

/** When somebody first offered a sked to somebody without an account. */
export interface GuestOfferTable {
  by_person_id: string;
  to_person_id: string;
  first_at: number;
}

export interface MailBlockTable {
  email: string;
  at: number;
}

export interface MailPreferenceTable {
  person_id: string;
  preference_json: string;
  updated_at: number;
}

export interface DigestSentTable {
  person_id: string;
  at: number;
}

export interface ReminderTable {
  id: string;
  sked_id: string;
  person_id: string;
  kind: 'before' | 'report';
  /** Before the start, or after the end. */
  minutes: number;
  agreed_version: number;
  due_at: number;
  queued_at: number | null;
  dropped_at: number | null;
}

export interface CalendarFeedTable {
  id: string;
  person_id: string;
  /** Null: every sked of the person. */
  station_id: string | null;
  token_hash: string;
  created_at: number;
  last_read_at: number | null;
}

export interface InboundMailTable {
  message_id: string;
  received_at: number;
  outcome: string;
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
  calendar_method: CalendarMethod | null;
  calendar_body: string | null;
  created_at: number;
  next_attempt_at: number;
  attempts: Generated<number>;
  leased_until: number | null;
  sent_at: number | null;
  set_aside_at: number | null;
  last_error: string | null;
  topic: Generated<MailTopic>;
  person_id: Generated<string | null>;
  sked_id: Generated<string | null>;
  activity_id: Generated<string | null>;
  reply_to: Generated<string | null>;
  unsubscribe_url: Generated<string | null>;
  reminder_id: Generated<string | null>;
}

export type ActivityState = 'collecting' | 'planned' | 'published';

export interface ActivityTable {
  id: string;
  slug: string;
  title: string;
  state: ActivityState;
  coordinator_id: string;
  start_at: number;
  end_at: number;
  slot_minutes: number;
  grid_minutes: number;
  band_change_minutes: number;
  most_in_a_row: number;
  least_pause_minutes: number;
  weights_json: string;
  invitation: Generated<string>;
  notes: Generated<string>;
  answers_by: number | null;
  version: Generated<number>;
  created_at: number;
  updated_at: number;
}

export interface ActivityBandTable {
  activity_id: string;
  band: BandId;
  frequency_mhz: number;
  mode: ModeId;
}

export interface ActivityStationTable {
  activity_id: string;
  station_id: string;
  /** Number on the roster, from 1. */
  place: number;
  answer: 'waiting' | 'coming' | 'notComing';
  /** Band ids; null: every band of the activity that the station has. */
  bands_json: string | null;
  /** [[startMs, endMs], …] within the activity; null: its usable hours. */
  hours_json: string | null;
  most_contacts: number | null;
  wants: Generated<'everyone' | 'list'>;
  priority: Generated<number>;
  note: Generated<string>;
  invited_at: number | null;
  reminded_at: number | null;
  answered_at: number | null;
  answered_by: string | null;
}

export interface ActivityWishTable {
  activity_id: string;
  station_id: string;
  partner_id: string;
  kind: 'want' | 'never';
  priority: Generated<number>;
}

export interface PlanRunTable {
  id: string;
  activity_id: string;
  state: 'queued' | 'running' | 'done' | 'stopped' | 'failed';
  problem_json: string;
  progress_json: string | null;
  result_json: string | null;
  error: string | null;
  asked_by: string | null;
  asked_at: number;
  leased_until: number | null;
  stop_asked_at: number | null;
  ended_at: number | null;
}

export interface ActivityRevisionTable {
  id: string;
  activity_id: string;
  number: number;
  state: 'draft' | 'published' | 'replaced';
  run_id: string | null;
  left_out_json: Generated<string>;
  note: Generated<string>;
  version: Generated<number>;
  created_at: number;
  published_at: number | null;
}

export interface ActivitySlotTable {
  id: string;
  revision_id: string;
  /** Comes before `station_b` on the roster. */
  station_a: string;
  station_b: string;
  band: BandId;
  start_at: number;
  end_at: number;
  pinned: Generated<0 | 1>;
  priority: number;
  chance: number | null;
  margin_db: number | null;
  sked_id: string | null;
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
  sked_message: SkedMessageTable;
  guest_link: GuestLinkTable;
  guest_offer: GuestOfferTable;
  mail_block: MailBlockTable;
  mail_preference: MailPreferenceTable;
  digest_sent: DigestSentTable;
  reminder: ReminderTable;
  calendar_feed: CalendarFeedTable;
  inbound_mail: InboundMailTable;
  activity: ActivityTable;
  activity_band: ActivityBandTable;
  activity_station: ActivityStationTable;
  activity_wish: ActivityWishTable;
  plan_run: PlanRunTable;
  activity_revision: ActivityRevisionTable;
  activity_slot: ActivitySlotTable;
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
export type ActivityRow = Selectable<ActivityTable>;
export type ActivityRevisionRow = Selectable<ActivityRevisionTable>;
export type PlanRunRow = Selectable<PlanRunTable>;
export type ActivitySlotRow = Selectable<ActivitySlotTable>;
