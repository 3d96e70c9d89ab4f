import { cutLocator, isLocator, locatorToPosition } from '../../domain/locator/locator';
import { PUBLIC_LOCATOR_LENGTHS, type PublicLocatorLength } from '../../domain/station/schema';
import { formatNumber } from '../../domain/time/format';
import { SelectField } from '../ui/Field';
import { LocatorMap } from './LocatorMap';
import { fieldId } from './useSave';

const CELL_SIZES: Record<PublicLocatorLength, string> = {
  4: 'about 110 km tall',
  6: 'about 4.6 km tall',
  8: 'about 460 m tall',
  10: 'about 20 m tall',
};

/** How much of the locator others see, with the map that shows it. */
export function PublicLocator({
  locator,
  length,
  onChange,
}: {
  locator: string;
  length: PublicLocatorLength;
  onChange: (length: PublicLocatorLength) => void;
}) {
  const shown = isLocator(locator) ? cutLocator(locator, length) : null;
  const place = shown ? locatorToPosition(shown) : null;
  const exact = isLocator(locator) ? locatorToPosition(locator) : null;
  return (
    <div className="stack">
      {place && exact && shown ? (
        <LocatorMap position={exact} cell={place.cell} cellName={shown} />
      ) : (
        <p className="quiet border border-dashed border-rule2 p-4">
          The map appears when the position is complete.
        </p>
      )}
      <SelectField
        id={fieldId('publicLocatorLength')}
        label="Others see"
        value={length}
        onChange={(event) => onChange(Number(event.target.value) as PublicLocatorLength)}
        note={
          shown && place
            ? `Others see ${shown}: between ${formatNumber(place.cell.south, 2)}° and ${formatNumber(place.cell.north, 2)}° latitude, ${CELL_SIZES[shown.length as PublicLocatorLength]}. Your exact position is used for computing and shown to your crew only.`
            : 'Your exact position is used for computing and shown to your crew only.'
        }
      >
        {PUBLIC_LOCATOR_LENGTHS.map((choice) => (
          <option key={choice} value={choice}>
            {choice} characters of the locator
          </option>
        ))}
      </SelectField>
    </div>
  );
}
