import { Link, Navigate } from 'react-router-dom';
import { paths } from '../../app/paths.ts';
import { rolesInWords } from '../../app/roles.ts';
import { type Membership, useMe } from '../../app/session.ts';
import type { Column } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { Page } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { PlaceList } from './place-list.tsx';

const text = words.home;

/** Where a person lands: their study, a choice of studies, or the places of the administrator. */
export function HomePage() {
  const me = useMe();
  const only = me.memberships.length === 1 ? me.memberships[0] : undefined;
  if (only) return <Navigate to={paths.study(only.study.id)} replace />;
  if (me.account.administrator) {
    return (
      <Page heading={text.administratorHeading} sentence={text.administratorSentence}>
        <PlaceList places={me.places} study={null} />
      </Page>
    );
  }
  if (me.memberships.length === 0) {
    return <Page heading={text.noneHeading} sentence={text.noneSentence} />;
  }
  return (
    <Page heading={text.chooseHeading} sentence={text.chooseSentence(me.memberships.length)}>
      <DataTable
        name="studies"
        caption={text.chooseHeading}
        noun={text.studiesNoun}
        columns={columns}
        rows={me.memberships}
        rowId={(row) => row.study.id}
      />
    </Page>
  );
}

const columns: Column<Membership>[] = [
  {
    id: 'study',
    heading: text.study,
    value: (row) => row.study.name,
    cell: (row) => <Link to={paths.study(row.study.id)}>{row.study.name}</Link>,
    grow: true,
  },
  { id: 'role', heading: text.yourRole, value: rolesInWords },
  {
    id: 'state',
    heading: text.states,
    value: (row) =>
      words.common.list([
        row.study.masked ? text.masked : text.notMasked,
        ...(row.study.state === 'open' ? [] : [text[row.study.state]]),
      ]),
  },
];
