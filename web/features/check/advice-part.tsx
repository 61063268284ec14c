import { paths } from '../../app/paths.ts';
import { useStudy } from '../../app/session.ts';
import { questionQuery } from '../../app/specification-address.ts';
import { ButtonLink } from '../../components/button.tsx';
import { Section } from '../../components/page.tsx';
import { adviceWords } from '../../words/advice.ts';
import { words } from '../../words/en.ts';
import type { PartProps } from './part-props.ts';

const text = words.check;

export function AdvicePart({ check, question }: PartProps) {
  const { study } = useStudy();
  return (
    <Section heading={text.partHeadings.advice}>
      <ol className="border-t border-line">
        {check.advice.map(adviceWords).map((advice, index) => (
          <li key={advice.fit} className="flex gap-4 border-b border-line py-3">
            <span className="figure w-5 shrink-0 text-faded">{index + 1}</span>
            <div>
              <h3 className="font-semibold">{advice.fit}</h3>
              <p className="max-w-text">{advice.why}</p>
              {advice.unless ? (
                <p className="max-w-text text-faded">{text.unless(advice.unless)}</p>
              ) : null}
            </div>
          </li>
        ))}
      </ol>
      <ButtonLink
        weight="filled"
        className="mt-4"
        to={`${paths.fit(study.id)}?${questionQuery(question)}&fit=pooled`}
      >
        {text.fitPooled}
      </ButtonLink>
    </Section>
  );
}
