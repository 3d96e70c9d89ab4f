import { readFileSync } from 'node:fs';
import type { Site } from '../../src/domain/sky/limits';

interface RawSite {
  lat_deg: number;
  lon_deg: number;
  height_m: number;
}

export interface MoonRecord {
  site: RawSite;
  utc: string;
  az_deg: number;
  el_deg: number;
  topo_range_km: number;
  range_rate_m_s: number;
  geo_range_km: number;
  ra_deg: number;
  dec_deg: number;
  sun_az_deg: number;
  sun_el_deg: number;
}

export interface CrossingSeries {
  site: RawSite;
  threshold_el_deg: number;
  events: { kind: 'rise' | 'set'; utc: string; az_deg: number; el_rate_deg_per_s: number }[];
}

function load(name: string): unknown {
  return JSON.parse(readFileSync(new URL(name, import.meta.url), 'utf8'));
}

/** 160 records of JPL DE405 reduced by IAU 2006/2000A models; the chain stands in the file's header. */
export const moonRecords = (load('moon-de405.json') as { records: MoonRecord[] }).records;

/** Rise and set of January 2027 from the same chain. */
export const crossingSeries = (load('moon-crossings-de405.json') as { series: CrossingSeries[] })
  .series;

export function siteOf(raw: RawSite): Site {
  return { latitudeDeg: raw.lat_deg, longitudeDeg: raw.lon_deg, heightM: raw.height_m };
}
