import { NavLink, useLocation, useNavigate } from 'react-router-dom';
import { words } from '../../words/en.ts';
import { placePath } from '../paths.ts';
import type { Me, Membership } from '../session.ts';
import { MenuButton } from './menu-button.tsx';

type PlacesProps = { me: Me; membership: Membership | null };

/** The row of places allowed to this person; in a narrow window one menu. */
export function Places({ me, membership }: PlacesProps) {
  const { pathname } = useLocation();
  const navigate = useNavigate();
  const study = membership?.study.id ?? null;
  const names = [...me.places, ...(membership?.places ?? [])];
  if (names.length === 0) return null;
  const places = names.map((name) => ({
    id: placePath(name, study),
    label: words.places[name],
  }));
  const here = places.find(({ id }) => pathname === id || pathname.startsWith(`${id}/`));

  return (
    <nav aria-label={words.topBar.places} className="no-print border-b border-line">
      <div className="mx-auto max-w-page px-4 narrow:px-8">
        <div className="py-1 narrow:hidden">
          <MenuButton
            label={here ? `${words.topBar.places}: ${here.label}` : words.topBar.places}
            items={places}
            onAction={(id) => void navigate(id)}
          />
        </div>
        <ul className="hidden flex-wrap gap-x-8 narrow:flex">
          {places.map((place) => (
            <li key={place.id}>
              <NavLink
                to={place.id}
                className={({ isActive }) =>
                  `-mb-px inline-flex min-h-10 items-center border-b-2 no-underline ${
                    isActive
                      ? 'border-ink font-semibold text-ink'
                      : 'border-transparent text-faded hover:text-ink'
                  }`
                }
              >
                {place.label}
              </NavLink>
            </li>
          ))}
        </ul>
      </div>
    </nav>
  );
}
