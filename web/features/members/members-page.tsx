import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { studyRoles } from '../../../api/contracts/common.ts';
import { type MemberView, memberListQuerySchema } from '../../../api/contracts/members.ts';
import { listQuery } from '../../app/list.ts';
import { useStudy } from '../../app/session.ts';
import { Button } from '../../components/button.tsx';
import type { Column, Filter } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { Moment } from '../../components/moment.tsx';
import { Page, Section } from '../../components/page.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { AddMemberForm } from './add-member-form.tsx';
import { ChangeMemberDialog } from './change-member-dialog.tsx';
import { dutiesInWords } from './duties-in-words.ts';
import { allMembers, membersQueryOptions } from './queries.ts';
import { RemoveMemberDialog } from './remove-member-dialog.tsx';

const text = words.members;
const PAGE_SIZE = memberListQuerySchema.parse({}).pageSize;
/** After a refusal the list is read again: the dialog then stands on what is held now, beside what was chosen. */
const heldNow = (rows: readonly MemberView[], member: MemberView) =>
  rows.find(({ id }) => id === member.id) ?? member;

const FILTERS: readonly Filter<MemberView>[] = [
  { id: 'text', label: text.search },
  {
    id: 'role',
    label: text.role,
    choices: studyRoles.map((role) => ({ value: role, label: words.roles[role] })),
  },
];
const FILTER_IDS = FILTERS.map(({ id }) => id);
const BY_NAME = { id: 'name', down: false };

type Act = { kind: 'change' | 'remove'; member: MemberView } | null;

export function MembersPage() {
  const { study } = useStudy();
  const control = useTableState({ filters: FILTER_IDS, initialSort: BY_NAME });
  const query = listQuery(control, PAGE_SIZE);
  const members = useQuery(membersQueryOptions(study.id, query));
  const [act, setAct] = useState<Act>(null);

  const columns: Column<MemberView>[] = [
    {
      id: 'name',
      heading: text.name,
      value: (row) => row.name,
      cell: (row) =>
        row.disabled ? (
          <>
            {row.name} <span className="text-faded">({text.disabled})</span>
          </>
        ) : (
          row.name
        ),
      sortable: true,
    },
    { id: 'email', heading: text.email, value: (row) => row.email, sortable: true },
    { id: 'role', heading: text.duties, value: dutiesInWords, sortable: true, place: 'wide' },
    {
      id: 'since',
      heading: text.since,
      value: (row) => row.since,
      cell: (row) => <Moment at={row.since} />,
      sortable: true,
    },
    {
      id: 'act',
      heading: text.act,
      value: () => null,
      notExported: true,
      place: 'act',
      cell: (member) => (
        <span className="flex flex-wrap gap-x-3">
          <Button
            weight="quiet"
            aria-label={text.changeOf(member.name)}
            onPress={() => setAct({ kind: 'change', member })}
          >
            {text.change}
          </Button>
          <Button
            weight="quiet"
            aria-label={text.removeOf(member.name)}
            onPress={() => setAct({ kind: 'remove', member })}
          >
            {text.remove}
          </Button>
        </span>
      ),
    },
  ];

  return (
    <Page heading={text.heading} sentence={text.sentence}>
      <Answer query={members}>
        {({ rows, total, sites }) => (
          <>
            <DataTable
              name="members"
              caption={text.caption}
              noun={text.noun}
              columns={columns}
              rows={rows}
              rowId={(row) => row.id}
              filters={FILTERS}
              initialSort={BY_NAME}
              server={{
                total,
                pageSize: PAGE_SIZE,
                allRows: () => allMembers(study.id, query),
              }}
            />
            <Section heading={text.addHeading} sentence={text.addSentence}>
              <AddMemberForm study={study.id} sites={sites} />
            </Section>
            {act?.kind === 'change' ? (
              <ChangeMemberDialog
                study={study.id}
                sites={sites}
                member={heldNow(rows, act.member)}
                onClose={() => setAct(null)}
              />
            ) : null}
            {act?.kind === 'remove' ? (
              <RemoveMemberDialog
                study={study.id}
                member={heldNow(rows, act.member)}
                onClose={() => setAct(null)}
              />
            ) : null}
          </>
        )}
      </Answer>
    </Page>
  );
}
