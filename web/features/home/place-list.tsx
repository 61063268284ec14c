import { Link } from 'react-router-dom';
import type { Place } from '../../../api/contracts/auth.ts';
import { placePath } from '../../app/paths.ts';
import { words } from '../../words/en.ts';

type PlaceListProps = {
  places: readonly Place[];
  study: string | null;
  /** Places where this person reads and changes nothing. */
  readOnly?: readonly Place[];
};

/** The places of a role, each with what is done there. */
export function PlaceList({ places, study, readOnly = [] }: PlaceListProps) {
  const text = words.home;
  return (
    <ul className="border-t border-line">
      {places.map((place) => (
        <li
          key={place}
          className="grid gap-x-6 border-b border-line py-3 narrow:grid-cols-[12rem_1fr] narrow:items-baseline"
        >
          <Link
            to={placePath(place, study)}
            className="target inline-flex items-center text-17 font-semibold"
          >
            {words.places[place]}
          </Link>
          <span className="max-w-text">
            {readOnly.includes(place) && place in text.readOnly
              ? text.readOnly[place as keyof typeof text.readOnly]
              : text.places[place]}
          </span>
        </li>
      ))}
    </ul>
  );
}
