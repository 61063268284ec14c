import { useQuery } from '@tanstack/react-query';
import type { SetupView } from '../../../api/contracts/setup.ts';
import { useStudy } from '../../app/session.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { Facts, Page, Section } from '../../components/page.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { measureColumns, siteColumns, visitColumns } from './columns.tsx';
import { setupQueryOptions } from './queries.ts';

const text = words.setup;

export function SetupPage() {
  const { study } = useStudy();
  const setup = useQuery(setupQueryOptions(study.id));
  return (
    <Page heading={text.heading} sentence={text.sentence(study.masked)}>
      <Answer query={setup}>{(view) => <SetupDocument view={view} />}</Answer>
    </Page>
  );
}

function SetupDocument({ view }: { view: SetupView }) {
  const { study, sites, arms, measures, visits } = view;
  return (
    <>
      <Section heading={text.study}>
        <Facts
          facts={[
            [text.name, study.name],
            [text.shortName, study.shortName],
            [text.state, text.states[study.state]],
            [text.masking, study.masked ? text.masked : text.notMasked],
            [text.closing, text.closingDays(study.closingDays)],
            [text.late, text.lateDays(study.lateDays)],
          ]}
        />
      </Section>
      <Section heading={text.schedule} sentence={text.scheduleSentence}>
        <DataTable
          name="schedule"
          caption={text.schedule}
          noun={text.visitNoun}
          columns={visitColumns}
          rows={visits}
          rowId={(row) => row.id}
          prefix="v-"
          plain
        />
      </Section>
      <Section heading={text.measures}>
        <DataTable
          name="measures"
          caption={text.measures}
          noun={text.measureNoun}
          columns={measureColumns}
          rows={measures}
          rowId={(row) => row.id}
          prefix="m-"
        />
      </Section>
      <Section heading={text.sites}>
        <DataTable
          name="sites"
          caption={text.sites}
          noun={text.siteNoun}
          columns={siteColumns}
          rows={sites}
          rowId={(row) => row.id}
          prefix="s-"
          plain
        />
      </Section>
      <Section heading={text.arms} sentence={arms.length > 0 ? text.armsSentence : text.noArms}>
        <ul className="border-t border-line">
          {arms.map((arm) => (
            <li key={arm} className="border-b border-line py-1.5">
              {arm}
            </li>
          ))}
        </ul>
      </Section>
    </>
  );
}
