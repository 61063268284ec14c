/** The independence check, in the order in which it is read: warning, twin, consequence, type, fits, lock. */

import { useQuery } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { CheckView } from '../../../api/contracts/analysis.ts';
import { cutQueryOptions } from '../../app/cut-queries.ts';
import { useStudy } from '../../app/session.ts';
import type { Question } from '../../app/specification-address.ts';
import { Page } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { AdvicePart } from './advice-part.tsx';
import { AmountPart } from './amount-part.tsx';
import { ConsequencePart } from './consequence-part.tsx';
import { headingOf, sentenceOf } from './headline.tsx';
import { LockPart } from './lock-part.tsx';
import type { PartProps } from './part-props.ts';
import { StructurePart } from './structure-part.tsx';
import { TwinPart } from './twin-part.tsx';
import { TypePart } from './type-part.tsx';

const text = words.check;

export function CheckReport(props: {
  check: CheckView;
  question: Question;
  form: React.ReactNode;
}) {
  const { check, question } = props;
  const { study } = useStudy();
  const cut = useQuery(cutQueryOptions(study.id, question.cut));
  const [params, setParams] = useSearchParams();
  const picked = params.get('subject');
  const onPick = useCallback(
    (id: string | null) =>
      setParams(
        (before) => {
          const next = new URLSearchParams(before);
          if (id === null) next.delete('subject');
          else next.set('subject', id);
          return next;
        },
        { replace: true, preventScrollReset: true },
      ),
    [setParams],
  );
  // Esc clears from anywhere on the page, not only from inside a picture.
  useEffect(() => {
    const clear = (event: KeyboardEvent) => {
      if (event.key === 'Escape' && !event.defaultPrevented) onPick(null);
    };
    document.addEventListener('keydown', clear);
    return () => document.removeEventListener('keydown', clear);
  }, [onPick]);
  const source = useMemo(
    () =>
      text.source({
        study: study.name,
        cut: words.analysis.cutName(check.cut.number, check.cut.name),
        specification: words.analysis.specification(
          check.specification.number,
          check.measure.label,
        ),
        engine: check.engine,
        seed: check.seed,
      }),
    [study.name, check],
  );
  const part: PartProps = {
    check,
    question,
    source,
    groups: check.specification.group ? (cut.data?.groups ?? []) : [],
    picked,
    onPick,
  };
  return (
    <Page
      warn={check.independence.warn}
      heading={headingOf(check)}
      title={text.title(check.measure.label)}
      sentence={sentenceOf(check)}
    >
      {props.form}
      {check.cautions.map(({ code }) => (
        <p key={code} className="mt-4 max-w-text border-l-4 border-edge pl-3">
          {text.cautions[code]}
        </p>
      ))}
      <TwinPart {...part} />
      <div className="mt-10 grid items-start gap-10 wide:grid-cols-[minmax(0,5fr)_minmax(0,7fr)]">
        <StructurePart {...part} />
        <AmountPart {...part} />
      </div>
      <ConsequencePart {...part} />
      <TypePart {...part} />
      <AdvicePart {...part} />
      <LockPart {...part} />
    </Page>
  );
}
