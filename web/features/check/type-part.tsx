import { useMemo } from 'react';
import { Successive, successivePairs } from '../../charts/variogram/successive.tsx';
import { Variogram } from '../../charts/variogram/variogram.tsx';
import { formatLoose } from '../../components/numbers.ts';
import { Section } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { fileNameOf, isTethered } from './facts.ts';
import type { PartProps } from './part-props.ts';

const text = words.check;

export function TypePart({ check, source, picked }: PartProps) {
  const { independence, measure, specification, observed } = check;
  const { verdict, variogram, serial } = independence;
  const pairs = useMemo(() => successivePairs(observed), [observed]);
  if (verdict === 'no_repeats') return null;
  const judged = typeof serial?.phi === 'number';
  const bins = variogram?.bins ?? [];
  const first = bins[0];
  const last = bins.at(-1);
  const unit = measure.unit ? `(${measure.unit})²` : '';
  return (
    <Section
      heading={
        verdict === 'exchangeable' && !judged ? text.typeNotJudged : text.typeHeadings[verdict]
      }
      sentence={
        verdict === 'serial' || verdict === 'exchangeable_and_serial'
          ? text.serialCaution
          : judged
            ? undefined
            : text.notJudged
      }
    >
      <div className="grid gap-10 wide:grid-cols-2">
        {variogram && first && last ? (
          <Variogram
            level={3}
            bins={bins}
            total={variogram.total}
            unit={measure.unit}
            timeUnit={words.analysis.units[specification.unit]}
            tethered={isTethered(check)}
            picture={{
              title: text.variogramTitle,
              text: text.variogramText(
                formatLoose(first.value),
                formatLoose(last.value),
                formatLoose(variogram.total),
                unit,
              ),
              source,
              stamp: null,
              fileName: fileNameOf(check, 'variogram'),
            }}
          />
        ) : (
          <p className="text-faded">{text.variogramMissing}</p>
        )}
        {pairs.length > 0 ? (
          <Successive
            level={3}
            pairs={pairs}
            unit={measure.unit}
            picked={picked}
            picture={{
              title:
                typeof serial?.lag1 === 'number'
                  ? text.successiveTitle(serial.lag1)
                  : text.successiveTitleNone,
              text:
                typeof serial?.lag1 === 'number'
                  ? text.successiveText(
                      serial.lag1,
                      serial.lag1_expected,
                      serial.permutation?.p ?? null,
                      serial.permutation?.draws ?? null,
                    )
                  : text.successiveTitleNone,
              source,
              stamp: null,
              fileName: fileNameOf(check, 'successive'),
            }}
          />
        ) : (
          <p className="text-faded">{text.successiveMissing}</p>
        )}
      </div>
    </Section>
  );
}
