import { useState } from 'react';
import type { NoiseRecord } from '../../domain/station/noiseRecord';
import { EquipmentEditor, type EquipmentStation } from './EquipmentEditor';
import { NoiseRecords } from './NoiseRecords';

interface Props {
  station: EquipmentStation;
  /** Newest first. */
  records: NoiseRecord[];
  /** "2027-01-18", UTC. */
  today: string;
  next?: string | undefined;
}

/** Equipment, and what was measured of it; a new record is at once there to be chosen. */
export function EquipmentPage({ station, records: first, today, next }: Props) {
  const [records, setRecords] = useState(first);
  const [saved, setSaved] = useState(station.equipment);
  return (
    <>
      <EquipmentEditor station={station} records={records} next={next} onSaved={setSaved} />
      <NoiseRecords
        stationId={station.id}
        records={records}
        equipment={saved}
        today={today}
        onChange={setRecords}
      />
    </>
  );
}
