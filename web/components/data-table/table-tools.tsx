import { Dialog, DialogTrigger, Popover } from 'react-aria-components';
import { words } from '../../words/en.ts';
import { Button } from '../button.tsx';
import { Checkbox } from '../checkbox.tsx';
import { type Column, headingOf } from './column.ts';

type TableToolsProps<Row> = {
  columns: readonly Column<Row>[];
  shown: readonly string[];
  setShown: (columns: string[] | null) => void;
  dense: boolean;
  setDense: (dense: boolean) => void;
  exportCsv: () => void;
};

/** Column choice, row height and the same view as a file. */
export function TableTools<Row>(props: TableToolsProps<Row>) {
  const { columns, shown } = props;
  return (
    <div className="table-tools no-print flex flex-wrap items-center gap-x-4">
      <DialogTrigger>
        <Button weight="quiet">{words.table.columns}</Button>
        <Popover
          placement="bottom end"
          className="rounded-3 border border-edge bg-panel text-15 text-ink"
        >
          <Dialog aria-label={words.table.columnsLabel} className="px-4 py-3 outline-none">
            {columns.map((column, index) => (
              <Checkbox
                key={column.id}
                checked={shown.includes(column.id)}
                disabled={index === 0 || column.fixed}
                onChange={(checked) => {
                  const next = columns
                    .filter(({ id }) => (id === column.id ? checked : shown.includes(id)))
                    .map(({ id }) => id);
                  const usual = columns.filter(({ hidden }) => !hidden).map(({ id }) => id);
                  props.setShown(next.join() === usual.join() ? null : next);
                }}
              >
                {headingOf(column)}
              </Checkbox>
            ))}
            <div className="mt-2 border-t border-line pt-2">
              <Checkbox checked={props.dense} onChange={props.setDense}>
                {words.table.dense}
              </Checkbox>
            </div>
          </Dialog>
        </Popover>
      </DialogTrigger>
      <Button weight="quiet" onPress={props.exportCsv}>
        {words.table.exportCsv}
      </Button>
    </div>
  );
}
