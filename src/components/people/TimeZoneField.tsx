import { zoneLabel, zoneNamesByRegion } from '../../domain/time/zoneNames';
import { SelectField } from '../ui/Field';

interface Props {
  id: string;
  label: string;
  value: string;
  note?: string | undefined;
  error?: string | undefined;
}

/** A time zone from the list. A zone that the list lacks, such as an old name, stays choosable. */
export function TimeZoneField({ id, value, ...rest }: Props) {
  const groups = zoneNamesByRegion();
  const listed = groups.some(({ zones }) => zones.includes(value));
  return (
    <SelectField id={id} name={id} defaultValue={value} required {...rest}>
      {listed ? null : <option value={value}>{zoneLabel(value)}</option>}
      {groups.map(({ region, zones }) => (
        <optgroup key={region} label={region}>
          {zones.map((zone) => (
            <option key={zone} value={zone}>
              {zone.replaceAll('_', ' ')}
            </option>
          ))}
        </optgroup>
      ))}
    </SelectField>
  );
}
