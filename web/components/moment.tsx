import { useZone } from '../app/session.ts';
import { formatDay, formatMoment } from './dates.ts';

/** A moment in the person's zone, with the zone. */
export function Moment({ at }: { at: string | null }) {
  const zone = useZone();
  if (!at) return formatMoment(at, zone);
  return (
    <time dateTime={at} className="text-13 whitespace-nowrap">
      {formatMoment(at, zone)}
    </time>
  );
}

/** A calendar day. */
export function Day({ on }: { on: string | null }) {
  return <span className="whitespace-nowrap">{formatDay(on)}</span>;
}
