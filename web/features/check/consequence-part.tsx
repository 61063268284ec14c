/** What ordinary errors would claim beside robust ones. Ordinary figures stand on the page only. */
import type { CheckView } from '../../../api/contracts/analysis.ts';
import { RatioBar, RatioTicks } from '../../charts/ratio/ratio-bar.tsx';
import { RatioBars } from '../../charts/ratio/ratio-bars.tsx';
import { type RatioScale, ratioScale } from '../../charts/ratio/ratio-scale.ts';
import { formatError, formatP, formatRatio } from '../../components/numbers.ts';
import { ScrollBox } from '../../components/scroll-box.tsx';
import { Stamp } from '../../components/stamp.tsx';
import { coefficientName, isTrend, slopeUnit } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';
import { fileNameOf } from './facts.ts';
import type { PartProps } from './part-props.ts';

const text = words.check.consequence;
type Row = CheckView['consequences'][number];

/** The coefficient whose ordinary error is furthest off. */
function worstOf(rows: readonly Row[], name: (row: Row) => string) {
  const known = rows.filter((row) => row.ratio !== null && row.ratio > 0);
  const by = (row: Row) => Math.abs(Math.log(row.ratio ?? 1));
  const worst = known.reduce<Row | null>(
    (most, row) => (most === null || by(row) > by(most) ? row : most),
    null,
  );
  if (!worst?.ratio || worst.ordinaryErrorIs === 'about right') return null;
  const times = worst.ratio > 1 ? worst.ratio : 1 / worst.ratio;
  return { name: name(worst), ratio: worst.ratio, times: formatRatio(times) };
}

export function ConsequencePart({ check, groups, source }: PartProps) {
  const { consequences, measure, specification } = check;
  const name = (row: Row) => coefficientName(row.coefficient, groups);
  const scale = ratioScale(consequences.flatMap((row) => [row.ratio, row.moulton]));
  return (
    <div className="mt-12">
      <RatioBars
        picture={{
          title: text.title(worstOf(consequences, name)),
          text: text.text(consequences.map((row) => text.part(name(row), row.ratio))),
          source,
          stamp: null,
          fileName: fileNameOf(check, 'errors'),
        }}
        rows={consequences.map((row) => ({
          name: name(row),
          ratio: row.ratio,
          moulton: row.moulton,
        }))}
        page={() => (
          <Table
            rows={consequences}
            scale={scale}
            stamped={check.independence.warn}
            name={name}
            unit={(row) =>
              isTrend(row.coefficient)
                ? slopeUnit(measure.unit, specification.unit)
                : (measure.unit ?? words.analysis.noUnit)
            }
          />
        )}
      >
        <p className="mt-2 max-w-text text-13 text-faded">{text.note}</p>
      </RatioBars>
    </div>
  );
}

function Table(props: {
  rows: readonly Row[];
  scale: RatioScale;
  stamped: boolean;
  name: (row: Row) => string;
  unit: (row: Row) => string;
}) {
  const { scale } = props;
  return (
    <div>
      {props.stamped ? (
        <p className="mb-2 flex flex-wrap items-center justify-end gap-3 text-13 text-faded">
          {text.stampNote} <Stamp text={words.analysis.stamp} />
        </p>
      ) : null}
      <ScrollBox label={text.caption}>
        <table className="table min-w-[940px]" aria-label={text.caption}>
          <thead>
            <tr>
              <th scope="col">{text.coefficient}</th>
              <th scope="col">{text.unit}</th>
              <th scope="col" className="numeric">
                {text.ordinary}
              </th>
              <th scope="col" className="numeric">
                {text.robust}
              </th>
              <th scope="col" className="numeric">
                {text.ratio}
              </th>
              <th scope="col" className="w-[24%]">
                <span className="sr-only">{text.bar}</span>
                <span className="block px-3">
                  <RatioTicks scale={scale} />
                </span>
              </th>
              <th scope="col" className="numeric">
                {text.pOrdinary}
              </th>
              <th scope="col" className="numeric">
                {text.pRobust}
              </th>
              <th scope="col">{text.is}</th>
            </tr>
          </thead>
          <tbody>
            {props.rows.map((row) => (
              <tr key={row.coefficient}>
                <th scope="row" className="min-w-40">
                  {props.name(row)}
                </th>
                <td className="whitespace-nowrap text-faded">{props.unit(row)}</td>
                <td className="numeric">{formatError(row.seOrdinary)}</td>
                <td className="numeric">{formatError(row.seRobust)}</td>
                <td className="numeric">{formatRatio(row.ratio)}</td>
                <td>
                  <span className="block px-3">
                    <RatioBar ratio={row.ratio} moulton={row.moulton} scale={scale} />
                  </span>
                </td>
                <td className="numeric text-faded">{formatP(row.pOrdinary)}</td>
                <td className="numeric">{formatP(row.pRobust)}</td>
                <td className="whitespace-nowrap">{text.verdicts[row.ordinaryErrorIs]}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </ScrollBox>
    </div>
  );
}
