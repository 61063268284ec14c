import { useMemo } from 'react';
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { Spaghetti } from '../../charts/spaghetti/spaghetti.tsx';
import type { SpaghettiData } from '../../charts/spaghetti/types.ts';
import { inSentence, perTime, timeNames } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';
import { groupsOf } from './headline.ts';
import type { RecordPartProps } from './part-props.ts';
import { recordFile } from './source.ts';

const text = words.records;

function dataOf(record: RecordDetail): SpaghettiData {
  const { picture, result, specification, measure } = record;
  const own = new Map((result.per_subject?.lines ?? []).map((line) => [line.subject, line]));
  return {
    subjects: picture.subjects.map((subject) => ({
      ...subject,
      own: own.get(subject.code) ?? null,
    })),
    visits: picture.visits,
    lines: picture.band,
    measure: inSentence(measure.label),
    unit: measure.unit,
    fromZero: measure.nature === 'count',
    timeName: timeNames[specification.axis][specification.unit],
    per: perTime[specification.unit],
    lineName: text.lineName[record.fit],
  };
}

export function PlotPart(props: RecordPartProps & { headline: string }) {
  const { record, source, headline, picked, onPick } = props;
  const data = useMemo(() => dataOf(record), [record]);
  return (
    <Spaghetti
      data={data}
      picked={picked}
      onPick={onPick}
      picture={{
        title: text.pictureTitle(record.measure.label, data.timeName, groupsOf(record).length > 1),
        text: text.pictureText(headline, data.subjects.length, data.visits.length),
        source,
        stamp: record.stamp,
        fileName: recordFile(record, 'subjects'),
      }}
    />
  );
}
