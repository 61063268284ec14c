import { useEffect, useEffectEvent, useId, useState } from 'react';
import { words } from '../../words/en.ts';
import { Button } from '../button.tsx';
import type { Filter } from './column.ts';
import type { TableControl } from './table-state.ts';

type FilterLineProps<Row> = {
  filters: readonly Filter<Row>[];
  control: TableControl;
  /** "12 of 160 subjects". */
  count: string;
};

/** The filters are one line of sentences over the table. */
export function FilterLine<Row>({ filters, control, count }: FilterLineProps<Row>) {
  const active = filters.some((filter) => control.filters[filter.id]);
  return (
    <div className="flex min-h-9 flex-wrap items-baseline gap-x-4 gap-y-1">
      {filters.map((filter) => (
        <FilterPart
          key={filter.id}
          filter={filter}
          value={control.filters[filter.id] ?? ''}
          set={(value) => control.setFilter(filter.id, value)}
        />
      ))}
      <span role="status">{count}</span>
      {active ? (
        <Button weight="quiet" onPress={control.clearFilters}>
          {words.table.clear}
        </Button>
      ) : null}
    </div>
  );
}

const PART =
  'target min-h-7 border-0 border-b border-edge bg-transparent px-1 py-0.5 text-15 text-ink';

function FilterPart<Row>(props: {
  filter: Filter<Row>;
  value: string;
  set: (value: string) => void;
}) {
  const { filter, value, set } = props;
  const id = useId();
  const label = (
    <label htmlFor={id} className="text-faded">
      {filter.label}
    </label>
  );
  if (filter.day) {
    return (
      <span className="inline-flex items-baseline gap-2">
        {label}
        <input
          id={id}
          type="date"
          className={`${PART} figure`}
          value={value}
          onChange={(event) => set(event.target.value)}
        />
      </span>
    );
  }
  if (!filter.choices) {
    return (
      <span className="inline-flex items-baseline gap-2">
        {label}
        <TextPart id={id} value={value} set={set} />
      </span>
    );
  }
  return (
    <span className="inline-flex max-w-full items-baseline gap-2">
      {label}
      <select
        id={id}
        className={`${PART} max-w-full ${value ? 'font-semibold' : ''}`}
        value={value}
        onChange={(event) => set(event.target.value)}
      >
        <option value="">{words.common.any}</option>
        {filter.choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
      </select>
    </span>
  );
}

/** Text is put into the address once the typing rests. */
function TextPart({ id, value, set }: { id: string; value: string; set: (value: string) => void }) {
  const [text, setText] = useState(value);
  const [settled, setSettled] = useState(value);
  if (value !== settled) {
    setSettled(value);
    setText(value);
  }
  const rested = useEffectEvent((typed: string) => {
    if (typed === value) return;
    setSettled(typed);
    set(typed);
  });
  // Only typing starts the wait.
  useEffect(() => {
    const timer = setTimeout(() => rested(text), 250);
    return () => clearTimeout(timer);
  }, [text]);
  return (
    <input
      id={id}
      type="search"
      className={`${PART} w-[14ch]`}
      value={text}
      onChange={(event) => setText(event.target.value)}
    />
  );
}
