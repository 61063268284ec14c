import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import type { SubjectDetail } from '../../../api/contracts/subjects.ts';
import { paths } from '../../app/paths.ts';
import { useStudy } from '../../app/session.ts';
import { CordAxis } from '../../charts/cord/cord-axis.tsx';
import { CordLegend } from '../../charts/cord/cord-legend.tsx';
import { formatDay } from '../../components/dates.ts';
import { Day } from '../../components/moment.tsx';
import { Facts, Page, Section } from '../../components/page.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { subjectQueryOptions } from './queries.ts';
import { ReadingCell } from './reading-cell.tsx';
import { SubjectCord, scaleOf } from './subject-cord.tsx';
import { VisitsTable } from './visits-table.tsx';

const text = words.subjects;

export function SubjectPage() {
  const { study } = useStudy();
  const { subject: id = '' } = useParams();
  const subject = useQuery(subjectQueryOptions(study.id, id));
  return <Answer query={subject}>{(detail) => <Shown study={study.id} subject={detail} />}</Answer>;
}

/** Planned visits that have come due, and how many of them took place. */
function doneAndDue({ visits }: SubjectDetail): { done: number; due: number } {
  const planned = visits.filter(
    ({ plannedVisitId, afterEnd }) => plannedVisitId !== null && !afterEnd,
  );
  const done = planned.filter(({ state }) => state === 'done' || state === 'partly done').length;
  return { done, due: planned.filter(({ state }) => state !== 'upcoming').length };
}

function Shown({ study, subject }: { study: string; subject: SubjectDetail }) {
  const { done, due } = doneAndDue(subject);
  const scale = scaleOf([subject.cord]);
  const once = subject.measures.filter(({ per }) => per === 'subject');
  return (
    <Page
      title={subject.code}
      heading={<span className="figure">{subject.code}</span>}
      sentence={`${text.sentenceOf(subject.site.name, done, due)}`}
      aside={<Link to={paths.subjects(study)}>{text.back}</Link>}
    >
      <CordAxis scale={scale} />
      <SubjectCord cord={subject.cord} scale={scale} />
      <div className="mt-2">
        <CordLegend />
      </div>
      <Section heading={text.visits} sentence={text.visitsSentence(subject.visits.length)}>
        <VisitsTable subject={subject} />
      </Section>
      {once.length > 0 ? (
        <Section heading={text.once}>
          <Facts
            facts={once.map((measure) => [
              measure.unit ? `${measure.label}, ${measure.unit}` : measure.label,
              <OnceReading key={measure.shortName} subject={subject} measure={measure} />,
            ])}
          />
        </Section>
      ) : null}
      <Section heading={text.factsHeading}>
        <Facts
          facts={[
            [
              text.consent,
              subject.consentVersion
                ? text.consentValue(subject.consentVersion, formatDay(subject.consentDate))
                : words.common.none,
            ],
            [text.enrolled, <Day key="enrolled" on={subject.enrolmentDate} />],
            [text.baseline, <Day key="baseline" on={subject.baselineDate} />],
            [text.state, subject.state],
            [text.stateDate, <Day key="state" on={subject.stateDate} />],
            [text.stateReason, subject.stateReason ?? words.common.none],
            [text.zone, subject.site.timeZone],
          ]}
        />
      </Section>
    </Page>
  );
}

function OnceReading({
  subject,
  measure,
}: {
  subject: SubjectDetail;
  measure: SubjectDetail['measures'][number];
}) {
  const readings = subject.once.filter((reading) => reading.measure === measure.shortName);
  if (readings.length === 0) return words.common.none;
  return readings.map((reading) => (
    <ReadingCell key={reading.id} reading={reading} measure={measure} />
  ));
}
