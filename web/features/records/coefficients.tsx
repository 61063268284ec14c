/** Every coefficient of the fit with its error; the other robust errors open below. */
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import {
  decimalsForError,
  formatDf,
  formatError,
  formatEstimate,
  formatInterval,
  formatLoose,
  formatNumber,
  formatP,
  formatRatio,
} from '../../components/numbers.ts';
import { Section } from '../../components/page.tsx';
import { ScrollBox } from '../../components/scroll-box.tsx';
import { coefficientName, inOrder, isTrend, slopeUnit } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';
import { coefficientOf, groupsOf } from './headline.ts';
import type { RecordPartProps } from './part-props.ts';

const text = words.records;
const names = text.coefficients;
const FEW_DF = 4;
const FINE_DIGITS = 2;

function keysOf({ result, fit }: RecordDetail): string[] {
  return inOrder(
    Object.keys((fit === 'ordinary' ? result.ols : result.pooled)?.coefficients ?? {}),
  );
}

function unitOf(record: RecordDetail, key: string): string {
  const { measure, specification } = record;
  return isTrend(key)
    ? slopeUnit(measure.unit, specification.unit)
    : (measure.unit ?? words.analysis.noUnit);
}

export function Coefficients({ record }: RecordPartProps) {
  const { result, stamp } = record;
  const groups = groupsOf(record);
  const test = groupTestOf(result.pooled);
  return (
    <Section
      heading={text.coefficientsHeading}
      aside={stamp ? <strong className="text-flare-ink">{stamp}</strong> : undefined}
    >
      <ScrollBox label={text.coefficientsCaption}>
        <table className="table" aria-label={text.coefficientsCaption}>
          <thead>
            <tr>
              <th scope="col">{names.name}</th>
              <th scope="col">{names.unit}</th>
              {[names.estimate, names.error, names.df, names.t, names.p, names.interval].map(
                (name) => (
                  <th key={name} scope="col" className="numeric">
                    {name}
                  </th>
                ),
              )}
            </tr>
          </thead>
          <tbody>
            {keysOf(record).map((key) => (
              <CoefficientRow
                key={key}
                name={coefficientName(key, groups)}
                unit={unitOf(record, key)}
                record={record}
                id={key}
              />
            ))}
          </tbody>
        </table>
      </ScrollBox>
      {test ? <p className="mt-2">{test}</p> : null}
      {record.fit === 'ordinary' && result.ols ? (
        <p className="mt-2 text-faded">
          {text.fitted(formatLoose(result.ols.sigma), formatRatio(result.ols.r_squared))}
        </p>
      ) : null}
      {result.pooled ? <AllErrors record={record} /> : null}
    </Section>
  );
}

function groupTestOf(pooled: RecordDetail['result']['pooled']): string | null {
  const test = pooled?.group_test;
  if (typeof test !== 'object' || test === null) return null;
  const { f, df1, df2, p } = test as Record<string, unknown>;
  return typeof f === 'number' &&
    typeof df1 === 'number' &&
    typeof df2 === 'number' &&
    typeof p === 'number'
    ? text.groupTest(f, df1, df2, p)
    : null;
}

function CoefficientRow(props: { record: RecordDetail; id: string; name: string; unit: string }) {
  const of = coefficientOf(props.record, props.id);
  if (!of) return null;
  const few = of.df !== null && of.df < FEW_DF;
  return (
    <tr>
      <th scope="row">{props.name}</th>
      <td className="whitespace-nowrap text-faded">{props.unit}</td>
      <td className="numeric">{formatEstimate(of.estimate, of.error)}</td>
      <td className="numeric">{formatError(of.error)}</td>
      <td className="numeric">{formatDf(of.df)}</td>
      <td className="numeric">
        {formatRatio(of.error === null || of.error === 0 ? null : of.estimate / of.error)}
      </td>
      <td className="numeric">{few ? words.common.none : formatP(of.p)}</td>
      <td className="numeric">{formatInterval(of.lower, of.upper, of.error)}</td>
    </tr>
  );
}

/** Two digits more than elsewhere: who opens this table holds it beside another program's. */
function fineNumber(error: number | null): (value: number | null) => string {
  const decimals = decimalsForError(error);
  return (value) =>
    decimals === null ? formatLoose(value) : formatNumber(value, decimals + FINE_DIGITS);
}

/** CR0 to CR3 beside each other, and the wild bootstrap, for those who compare. */
function AllErrors({ record }: { record: RecordDetail }) {
  const { pooled } = record.result;
  const groups = groupsOf(record);
  if (!pooled) return null;
  const wild = pooled.wild_bootstrap;
  const webb = Object.values(wild ?? {}).some((each) => typeof each.webb_p === 'number');
  return (
    <details className="mt-3">
      <summary className="target inline-flex cursor-pointer items-center text-kelp underline underline-offset-4">
        {text.errorsShow}
      </summary>
      <div className="mt-2">
        <ScrollBox label={text.errorsHeading}>
          <table className="table" aria-label={text.errorsHeading}>
            <thead>
              <tr>
                <th scope="col">{names.name}</th>
                <th scope="col">{names.unit}</th>
                {[names.estimate, names.cr0, names.cr1, names.cr1s, names.cr2, names.cr3].map(
                  (name) => (
                    <th key={name} scope="col" className="numeric">
                      {name}
                    </th>
                  ),
                )}
                <th scope="col" className="numeric">
                  {names.wild}
                </th>
                {webb ? (
                  <th scope="col" className="numeric">
                    {names.webb}
                  </th>
                ) : null}
              </tr>
            </thead>
            <tbody>
              {inOrder(Object.keys(pooled.coefficients)).map((key) => {
                const of = pooled.coefficients[key];
                const boot = wild?.[key];
                if (!of) return null;
                const fine = fineNumber(of.se_cr2);
                return (
                  <tr key={key}>
                    <th scope="row">{coefficientName(key, groups)}</th>
                    <td className="whitespace-nowrap text-faded">{unitOf(record, key)}</td>
                    <td className="numeric">{fine(of.estimate)}</td>
                    {[of.se_cr0, of.se_cr1, of.se_cr1s, of.se_cr2, of.se_cr3].map(
                      (error, index) => (
                        <td key={names[ERRORS[index] ?? 'cr0']} className="numeric">
                          {fine(error)}
                        </td>
                      ),
                    )}
                    <td className="numeric">
                      {boot ? text.wildNote(boot.p, boot.draws) : words.common.none}
                    </td>
                    {webb ? (
                      <td className="numeric">
                        {typeof boot?.webb_p === 'number'
                          ? formatP(boot.webb_p)
                          : words.common.none}
                      </td>
                    ) : null}
                  </tr>
                );
              })}
            </tbody>
          </table>
        </ScrollBox>
        {webb ? <p className="mt-2 max-w-text text-13 text-faded">{text.wildFew}</p> : null}
      </div>
    </details>
  );
}

const ERRORS = ['cr0', 'cr1', 'cr1s', 'cr2', 'cr3'] as const;
