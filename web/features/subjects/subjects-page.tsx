import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import {
  type SubjectRow,
  subjectListQuerySchema,
  subjectStates,
} from '../../../api/contracts/subjects.ts';
import { address, apiFile } from '../../app/api.ts';
import { listQuery } from '../../app/list.ts';
import { paths } from '../../app/paths.ts';
import { sentenceOf } from '../../app/problem.ts';
import { useStudy } from '../../app/session.ts';
import { CordAxis, cordUnit } from '../../charts/cord/cord-axis.tsx';
import { CordLegend } from '../../charts/cord/cord-legend.tsx';
import type { CordScale } from '../../charts/cord/types.ts';
import { ButtonLink } from '../../components/button.tsx';
import { saveFile } from '../../components/csv.ts';
import type { Column, Filter } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { Day } from '../../components/moment.tsx';
import { notify } from '../../components/notices.tsx';
import { Page } from '../../components/page.tsx';
import { Answer, Empty } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { subjectsPath, subjectsQueryOptions } from './queries.ts';
import { SubjectCord, scaleOf } from './subject-cord.tsx';

const text = words.subjects;
const PAGE_SIZE = subjectListQuerySchema.parse({}).pageSize;
const FILTER_IDS = ['site', 'state', 'text'];
const BY_CODE = { id: 'code', down: false };

function columnsOf(study: string, scale: CordScale): Column<SubjectRow>[] {
  return [
    {
      id: 'code',
      heading: text.code,
      value: (row) => row.code,
      cell: (row) => (
        <Link className="figure" to={paths.subject(study, row.id)}>
          {row.code}
        </Link>
      ),
      sortable: true,
    },
    {
      id: 'cord',
      heading: text.followUp,
      unit: text.sinceBaseline[cordUnit(scale)],
      headingExtra: <CordAxis scale={scale} named={false} />,
      value: () => null,
      cell: (row) => <SubjectCord cord={row.cord} scale={scale} />,
      notExported: true,
      grow: true,
      place: 'first',
    },
    {
      id: 'site',
      heading: text.site,
      value: (row) => row.site.name,
      sortable: true,
    },
    { id: 'state', heading: text.state, value: (row) => row.state, sortable: true },
    {
      id: 'visitsDone',
      heading: text.doneOfDue,
      value: (row) => `${row.visitsDone} / ${row.visitsDue}`,
      sortable: true,
      numeric: true,
    },
    {
      id: 'lastVisit',
      heading: text.lastVisit,
      value: (row) => row.lastVisit,
      cell: (row) => <Day on={row.lastVisit} />,
      sortable: true,
    },
    {
      id: 'baselineDate',
      heading: text.baseline,
      value: (row) => row.baselineDate,
      cell: (row) => <Day on={row.baselineDate} />,
      sortable: true,
      hidden: true,
    },
    {
      id: 'stateDate',
      heading: text.stateDate,
      value: (row) => row.stateDate,
      cell: (row) => <Day on={row.stateDate} />,
      hidden: true,
    },
  ];
}

export function SubjectsPage() {
  const { study, places } = useStudy();
  const control = useTableState({ filters: FILTER_IDS, initialSort: BY_CODE });
  const query = listQuery(control, PAGE_SIZE);
  const subjects = useQuery(subjectsQueryOptions(study.id, query));

  function exportCsv() {
    apiFile(
      address(`${subjectsPath(study.id)}.csv`, { ...query, page: undefined, pageSize: undefined }),
    )
      .then((file) => saveFile('subjects.csv', file))
      .catch((error) => notify(sentenceOf(error), { urgent: true }));
  }

  return (
    <Page heading={text.heading} sentence={text.sentence}>
      <Answer query={subjects}>
        {({ rows, total, totalUnfiltered, sites }) => {
          const filters: Filter<SubjectRow>[] = [
            {
              id: 'site',
              label: text.site,
              choices: sites.map(({ code, name }) => ({ value: code, label: name, note: code })),
            },
            {
              id: 'state',
              label: text.state,
              choices: subjectStates.map((value) => ({ value, label: value })),
            },
            { id: 'text', label: text.text },
          ];
          const mayImport = places.includes('import');
          return (
            <>
              <DataTable
                name="subjects"
                caption={text.caption}
                noun={text.noun}
                columns={columnsOf(study.id, scaleOf(rows.map((row) => row.cord)))}
                rows={rows}
                rowId={(row) => row.id}
                filters={filters}
                initialSort={BY_CODE}
                server={{ total, pageSize: PAGE_SIZE, exportCsv }}
                empty={
                  totalUnfiltered === 0 ? (
                    <Empty
                      what={mayImport ? `${text.empty} ${text.emptyImportHint}` : text.empty}
                      act={
                        mayImport ? (
                          <ButtonLink to={paths.imports(study.id)}>{text.emptyImport}</ButtonLink>
                        ) : null
                      }
                    />
                  ) : undefined
                }
              />
              {rows.length > 0 ? (
                <div className="mt-6">
                  <CordLegend />
                </div>
              ) : null}
            </>
          );
        }}
      </Answer>
    </Page>
  );
}
