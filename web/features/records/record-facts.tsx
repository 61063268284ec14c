import { Link } from 'react-router-dom';
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { apiFile } from '../../app/api.ts';
import { paths } from '../../app/paths.ts';
import { sentenceOf } from '../../app/problem.ts';
import { useStudy } from '../../app/session.ts';
import { questionQuery } from '../../app/specification-address.ts';
import { Button, ButtonLink } from '../../components/button.tsx';
import { saveFile } from '../../components/csv.ts';
import { Hash } from '../../components/hash.tsx';
import { Moment } from '../../components/moment.tsx';
import { notify } from '../../components/notices.tsx';
import { Facts, Section } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { recordPath } from './queries.ts';
import { recordFile } from './source.ts';

const text = words.records;
const names = text.facts;

export function RecordFacts({ record }: { record: RecordDetail }) {
  const { study, roles } = useStudy();
  const { acknowledgement, specification } = record;
  async function download() {
    try {
      const file = await apiFile(`${recordPath(study.id, record.id)}/file`);
      saveFile(`${recordFile(record, 'record')}.json`, file);
    } catch (error) {
      notify(`${text.downloadFailed} ${sentenceOf(error)}`, { urgent: true });
    }
  }
  return (
    <Section heading={text.factsHeading}>
      <Facts
        facts={[
          [names.run, <Moment key="run" at={record.at} />],
          [names.by, record.by],
          [names.purpose, words.analysis.purposes[record.purpose]],
          [
            names.cut,
            <Link key="cut" to={paths.cut(study.id, record.cut.id)}>
              {words.analysis.cutName(record.cut.number, record.cut.name)}
            </Link>,
          ],
          [names.cutHash, <Hash key="cut-hash" value={record.cutSha256} />],
          [
            names.specification,
            text.specificationNumber(specification.number, record.measure.label),
          ],
          [names.specificationHash, <Hash key="specification" value={specification.sha256} />],
          [names.engine, names.engineOf(record.engine, record.seed)],
          [names.counts, names.countsOf(record.counts.used, record.counts.rows)],
          ...(acknowledgement
            ? [
                [
                  names.acknowledgement,
                  names.acknowledgementOf(acknowledgement.by, acknowledgement.reason),
                ] as const,
              ]
            : []),
          [names.content, <Hash key="content" value={record.contentSha256} copy />],
        ]}
      />
      <div className="no-print mt-4 flex flex-wrap gap-3">
        <Button onPress={() => void download()}>{text.download}</Button>
        {roles.includes('analyst') ? (
          <ButtonLink
            to={`${paths.check(study.id)}?${questionQuery({ cut: record.cut.id, specification })}`}
          >
            {text.again}
          </ButtonLink>
        ) : null}
      </div>
    </Section>
  );
}
