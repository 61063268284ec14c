import type { CheckView } from '../../../api/contracts/analysis.ts';
import { formatCount, formatRatio } from '../../components/numbers.ts';
import { words } from '../../words/en.ts';
import type { PartProps } from './part-props.ts';

const text = words.check.amount;
const NONE = words.common.none;

type Row = { name: string; value: string; interval: string; says: string };

/** Why a number is missing, where the engine says so beside it. */
function reasonOf(block: Record<string, unknown>, name: string): string {
  const reason = block[`${name}_reason`];
  return typeof reason === 'string' ? reason : '';
}

function intervalText(of: { lower: number | null; upper: number | null }): string {
  return of.lower === null || of.upper === null
    ? NONE
    : text.intervalOf(formatRatio(of.lower), formatRatio(of.upper));
}

function rowsOf({ independence, structure }: CheckView): Row[] {
  const icc = independence.icc_residual;
  const raw = independence.icc_response;
  const { design_effect: effect, effective_n: effective, lr_test: lr, permutation } = independence;
  const none = (name: string, key: string): Row => ({
    name,
    value: NONE,
    interval: NONE,
    says: reasonOf(independence, key),
  });
  return [
    icc
      ? {
          name: text.icc,
          value: formatRatio(icc.estimate),
          interval: intervalText(icc),
          says: icc.estimate < 0 ? text.iccNegative : text.iccSays,
        }
      : none(text.icc, 'icc_residual'),
    raw
      ? {
          name: text.iccResponse,
          value: formatRatio(raw.estimate),
          interval: intervalText(raw),
          says: text.iccResponseSays,
        }
      : none(text.iccResponse, 'icc_response'),
    effect === null
      ? none(text.designEffect, 'design_effect')
      : {
          name: text.designEffect,
          value: formatRatio(effect),
          interval: NONE,
          says: text.designEffectSays,
        },
    effective === null
      ? none(text.effective, 'effective_n')
      : {
          name: text.effective,
          value: formatCount(Math.round(effective)),
          interval: NONE,
          says:
            effective > structure.readings
              ? text.effectiveMore(structure.readings)
              : text.effectiveSays(structure.readings),
        },
    lr
      ? { name: text.lr, value: text.lrValue(lr.lr), interval: NONE, says: text.lrSays(lr.p) }
      : none(text.lr, 'lr_test'),
    permutation
      ? {
          name: text.permutation,
          value: text.permutationValue(permutation.statistic),
          interval: NONE,
          says: text.permutationSays(permutation.p, permutation.draws),
        }
      : none(text.permutation, 'permutation'),
  ];
}

export function AmountPart({ check }: PartProps) {
  return (
    <section className="min-w-0">
      <h2 className="mb-2 text-17 font-semibold">{words.check.partHeadings.amount}</h2>
      <table className="table">
        <thead>
          <tr>
            <th scope="col">{text.quantity}</th>
            <th scope="col" className="numeric">
              {text.value}
            </th>
            <th scope="col" className="numeric">
              {text.interval}
            </th>
          </tr>
        </thead>
        <tbody>
          {rowsOf(check).map((row) => (
            <tr key={row.name}>
              <th scope="row">
                <span className="block pt-1">{row.name}</span>
                <span className="block pb-1 text-13 text-faded">{row.says}</span>
              </th>
              <td className="numeric">{row.value}</td>
              <td className="numeric">{row.interval}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
