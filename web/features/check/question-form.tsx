/** Which question is asked of which cut. It stands in the address, so that it can be sent and found again. */
import { useQuery } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { CutMeasure, CutSummary } from '../../../api/contracts/cuts.ts';
import { cutQueryOptions } from '../../app/cut-queries.ts';
import { useStudy } from '../../app/session.ts';
import { questionOf, questionQuery } from '../../app/specification-address.ts';
import { Button } from '../../components/button.tsx';
import { Checkbox } from '../../components/checkbox.tsx';
import { formatDay } from '../../components/dates.ts';
import { RadioGroup } from '../../components/radio-group.tsx';
import { Select } from '../../components/select.tsx';
import { words } from '../../words/en.ts';

const text = words.check;
const shared = words.analysis;

/** Why a measure has no straight line; the server says the same where it is chosen all the same. */
function noteOf(measure: CutMeasure): string | undefined {
  if (measure.per === 'subject') return text.natures.once;
  if (measure.nature === 'yes_no' || measure.nature === 'choice')
    return text.natures[measure.nature];
  return measure.unit ?? undefined;
}

export function QuestionForm({ cuts }: { cuts: readonly CutSummary[] }) {
  const { study } = useStudy();
  const [params, setParams] = useSearchParams();
  const asked = questionOf(params);
  const [cut, setCut] = useState(params.get('cut') ?? cuts[0]?.id ?? '');
  const chosen = cuts.find(({ id }) => id === cut);
  const measures = chosen?.measures ?? [];
  const [named, setMeasure] = useState(params.get('measure') ?? '');
  const [axis, setAxis] = useState(asked?.specification.axis ?? 'since_baseline');
  const [unit, setUnit] = useState(asked?.specification.unit ?? 'weeks');
  const [group, setGroup] = useState(asked?.specification.group ?? false);
  const detail = useQuery({ ...cutQueryOptions(study.id, cut), enabled: cut !== '' });
  const groups = detail.data?.groups ?? [];
  const measure = measures.some(({ shortName }) => shortName === named) ? named : '';
  const next = questionQuery({
    cut,
    specification: { measure, axis, unit, group: group && groups.length > 1 },
  });
  const isNew = asked === null || next !== questionQuery(asked);

  function open(event: FormEvent) {
    event.preventDefault();
    if (cut && measure) setParams(new URLSearchParams(next));
  }

  return (
    <form
      onSubmit={open}
      aria-label={text.formLabel}
      className="no-print flex flex-wrap items-end gap-x-6 gap-y-3 border-b border-line pb-4"
    >
      <Select
        label={shared.cutLabel}
        value={cut}
        onChange={setCut}
        choices={cuts.map((each) => ({
          value: each.id,
          label: shared.cutName(each.number, each.name),
          note: formatDay(each.visitCutoff),
        }))}
      />
      <Select
        label={shared.measureLabel}
        value={measure}
        onChange={setMeasure}
        choices={measures.map((each) => ({
          value: each.shortName,
          label: each.label,
          note: noteOf(each),
        }))}
      />
      <RadioGroup
        label={shared.axisLabel}
        inline
        value={axis}
        onChange={(value) => setAxis(value === 'planned_day' ? value : 'since_baseline')}
        choices={[
          { value: 'since_baseline', label: shared.axes.since_baseline },
          { value: 'planned_day', label: shared.axes.planned_day },
        ]}
      />
      <RadioGroup
        label={shared.unitLabel}
        inline
        value={unit}
        onChange={(value) => setUnit(value === 'days' ? value : 'weeks')}
        choices={[
          { value: 'days', label: shared.units.days },
          { value: 'weeks', label: shared.units.weeks },
        ]}
      />
      {groups.length > 1 ? (
        <Checkbox checked={group} onChange={setGroup}>
          {shared.groupLabel}
        </Checkbox>
      ) : null}
      <Button type="submit" weight={asked ? 'outlined' : 'filled'} isDisabled={!measure || !isNew}>
        {asked ? text.again : text.open}
      </Button>
    </form>
  );
}
