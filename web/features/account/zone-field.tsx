import { useId } from 'react';
import { words } from '../../words/en.ts';

const text = words.account;
const ZONES = ['UTC', ...Intl.supportedValuesOf('timeZone').filter((zone) => zone !== 'UTC')];

type ZoneFieldProps = { value: string; onChange: (zone: string) => void; reading: string };

/** Some 400 zones: the browser's own list, which is found by typing and known to every phone. */
export function ZoneField({ value, onChange, reading }: ZoneFieldProps) {
  const id = useId();
  const zones = ZONES.includes(value) ? ZONES : [value, ...ZONES];
  return (
    <div className="max-w-full">
      <label htmlFor={id} className="block font-semibold">
        {text.timeZone}
      </label>
      <span id={`${id}-hint`} className="block max-w-text text-13 text-faded">
        {text.timeZoneHint}
      </span>
      <div className="mt-1 flex flex-wrap items-center gap-3">
        <select
          id={id}
          aria-describedby={`${id}-hint`}
          className="control max-w-full"
          value={value}
          onChange={(event) => onChange(event.target.value)}
        >
          {zones.map((zone) => (
            <option key={zone}>{zone}</option>
          ))}
        </select>
        <span className="text-13 text-faded">{reading}</span>
      </div>
    </div>
  );
}
