import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { cutQueryOptions } from '../../app/cut-queries.ts';
import { paths } from '../../app/paths.ts';
import { useStudy } from '../../app/session.ts';
import { type Question, questionOf } from '../../app/specification-address.ts';
import { ButtonLink } from '../../components/button.tsx';
import { formatDay } from '../../components/dates.ts';
import { Facts, Page, Section } from '../../components/page.tsx';
import { Stamp } from '../../components/stamp.tsx';
import { Answer, Empty, Forbidden } from '../../components/states.tsx';
import { timeNames } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';
import { PurposeForm } from './purpose-form.tsx';

const text = words.fit;
type Fit = 'pooled' | 'ordinary';

/** Asks what the fit is for, before anybody sees it; the result stands at the address of its record. */
export function FitPage() {
  const { study, roles } = useStudy();
  const [params] = useSearchParams();
  const question = questionOf(params);
  const fit: Fit = params.get('fit') === 'ordinary' ? 'ordinary' : 'pooled';
  if (!roles.includes('analyst'))
    return (
      <Page heading={text.heading}>
        <Forbidden sentence={text.forbidden} />
      </Page>
    );
  if (question) return <Asked question={question} fit={fit} />;
  return (
    <Page heading={text.nothingHeading}>
      <Empty
        what={text.nothingSentence}
        act={
          <ButtonLink weight="filled" to={paths.check(study.id)}>
            {text.backToCheck}
          </ButtonLink>
        }
      />
    </Page>
  );
}

function Asked({ question, fit }: { question: Question; fit: Fit }) {
  const { study } = useStudy();
  const { specification } = question;
  const cut = useQuery(cutQueryOptions(study.id, question.cut));
  return (
    <Answer query={cut}>
      {(data) => {
        const measure = data.measures.find(({ shortName }) => shortName === specification.measure);
        const label = measure?.label ?? specification.measure;
        return (
          <Page
            heading={text.heading}
            sentence={text.sentence(words.analysis.fits[fit], label)}
            aside={fit === 'ordinary' ? <Stamp text={words.analysis.stamp} /> : undefined}
          >
            <PurposeForm question={question} fit={fit} />
            <Section heading={text.what}>
              <Facts
                facts={[
                  [text.fit, words.analysis.fits[fit]],
                  [
                    text.cut,
                    `${words.analysis.cutName(data.number, data.name)}, ${text.visitsTo(formatDay(data.visitCutoff))}`,
                  ],
                  [text.measure, measure?.unit ? `${label}, ${measure.unit}` : label],
                  [text.time, timeNames[specification.axis][specification.unit]],
                  [text.group, specification.group ? text.compared(data.groups) : text.together],
                ]}
              />
            </Section>
          </Page>
        );
      }}
    </Answer>
  );
}
