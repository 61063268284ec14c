import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import type { CutDetail } from '../../../api/contracts/cuts.ts';
import { apiFile } from '../../app/api.ts';
import { cutPath, cutQueryOptions } from '../../app/cut-queries.ts';
import { paths } from '../../app/paths.ts';
import { sentenceOf } from '../../app/problem.ts';
import { useStudy } from '../../app/session.ts';
import { Button, ButtonLink } from '../../components/button.tsx';
import { saveFile } from '../../components/csv.ts';
import { formatDay } from '../../components/dates.ts';
import { Hash } from '../../components/hash.tsx';
import { Moment } from '../../components/moment.tsx';
import { notify } from '../../components/notices.tsx';
import { formatCount } from '../../components/numbers.ts';
import { Facts, Page, Section } from '../../components/page.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { LateRows, PendingRows } from './open-rows.tsx';

const text = words.cuts;

export function CutPage() {
  const { study } = useStudy();
  const { cut = '' } = useParams();
  const query = useQuery(cutQueryOptions(study.id, cut));
  return <Answer query={query}>{(data) => <Cut cut={data} />}</Answer>;
}

function Cut({ cut }: { cut: CutDetail }) {
  const { study, roles } = useStudy();
  async function download() {
    try {
      saveFile(`cut-${cut.number}.csv`, await apiFile(`${cutPath(study.id, cut.id)}/file`));
    } catch (error) {
      notify(`${text.downloadFailed} ${sentenceOf(error)}`, { urgent: true });
    }
  }
  return (
    <Page
      heading={text.cutHeading(cut.number, cut.name, formatDay(cut.visitCutoff))}
      sentence={text.cutSentence(cut.rows, cut.subjects)}
    >
      <Facts
        facts={[
          [text.hash, <Hash key="hash" value={cut.sha256} copy />],
          [text.enteredUntil, <Moment key="until" at={cut.enteredUntil} />],
          [text.frozenBy, cut.frozenBy],
          [
            text.measures,
            words.common.list(
              cut.measures.map(({ label, unit }) => (unit ? `${label} (${unit})` : label)),
            ),
          ],
          [text.lateShort, <Figure key="late" value={cut.late} />],
          [text.pendingShort, <Figure key="pending" value={cut.pending} />],
          [text.withdrawnLeftOut, withdrawnText(cut)],
          [text.exclusions, <Exclusions key="exclusions" cut={cut} />],
        ]}
      />
      <div className="no-print mt-4 flex flex-wrap gap-3">
        {roles.includes('analyst') ? (
          <ButtonLink
            weight="filled"
            to={`${paths.check(study.id)}?${new URLSearchParams({ cut: cut.id }).toString()}`}
          >
            {text.checkLink}
          </ButtonLink>
        ) : null}
        <Button onPress={() => void download()}>{text.download}</Button>
      </div>
      <Difference cut={cut} />
      <LateRows cut={cut} />
      <PendingRows cut={cut} />
    </Page>
  );
}

function Figure({ value }: { value: number }) {
  return <span className="figure">{formatCount(value)}</span>;
}

function withdrawnText(cut: CutDetail): string {
  if (cut.includeWithdrawnReason !== null) return text.withdrawnIn(cut.includeWithdrawnReason);
  const { readings, subjects } = cut.withdrawnLeftOut;
  return readings === 0 ? text.withdrawnNone : text.withdrawnOut(readings, subjects);
}

function Exclusions({ cut }: { cut: CutDetail }) {
  if (cut.exclusions.length === 0) return text.exclusionsNone;
  const labelOf = (shortName: string | null) =>
    cut.measures.find((measure) => measure.shortName === shortName)?.label ?? shortName;
  return (
    <ul>
      {cut.exclusions.map((each) => (
        <li key={`${each.subjectCode} ${each.measure} ${each.visit}`}>
          {text.exclusionLine(
            each.subjectCode,
            text.exclusionWhat(labelOf(each.measure), each.visit),
            each.reason,
          )}
        </li>
      ))}
    </ul>
  );
}

function Difference({ cut }: { cut: CutDetail }) {
  const { difference } = cut;
  if (!difference) return <p className="mt-6 text-faded">{text.first}</p>;
  return (
    <Section
      heading={text.differenceHeading(difference.against.number)}
      sentence={text.differenceSentence(difference.against.number, difference.against.name)}
    >
      <Facts
        facts={[
          [text.added, <Figure key="added" value={difference.added} />],
          [text.changed, <Figure key="changed" value={difference.changed} />],
          [text.gone, <Figure key="gone" value={difference.gone} />],
        ]}
      />
    </Section>
  );
}
