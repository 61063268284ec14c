import { median } from 'd3';
import { useMemo } from 'react';
import {
  Residuals,
  residualDomain,
  type SubjectResiduals,
} from '../../charts/residuals/residuals.tsx';
import { formatLoose } from '../../components/numbers.ts';
import { words } from '../../words/en.ts';
import { fileNameOf, isTethered } from './facts.ts';
import type { PartProps } from './part-props.ts';

const text = words.check;

/** How wide the middle subject's residuals spread. */
function middleSpan(subjects: readonly SubjectResiduals[]): string {
  const spans = subjects
    .filter(({ residuals }) => residuals.length > 1)
    .map(({ residuals }) => Math.max(...residuals) - Math.min(...residuals));
  return formatLoose(median(spans));
}

export function TwinPart({ check, source, picked, onPick }: PartProps) {
  const { observed, dealt, measure } = check;
  const domain = useMemo(() => residualDomain(observed), [observed]);
  const unit = measure.unit ?? '';
  const shared = { domain, unit: measure.unit, picked, onPick };
  return (
    <div className="mt-10 grid gap-10 wide:grid-cols-2">
      <Residuals
        {...shared}
        subjects={observed}
        tethered={isTethered(check)}
        picture={{
          title: text.observedTitle(isTethered(check)),
          text: text.observedText(measure.label, observed.length, middleSpan(observed), unit),
          source,
          stamp: null,
          fileName: fileNameOf(check, 'residuals'),
        }}
      />
      <Residuals
        {...shared}
        subjects={dealt}
        tethered={false}
        picture={{
          title: text.dealtTitle,
          text: text.dealtText(middleSpan(dealt), unit),
          source,
          stamp: null,
          fileName: fileNameOf(check, 'dealt-twin'),
        }}
      />
    </div>
  );
}
