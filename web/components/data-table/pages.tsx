import { words } from '../../words/en.ts';
import { Button } from '../button.tsx';

type PagesProps = {
  page: number;
  pageSize: number;
  total: number;
  setPage: (page: number) => void;
};

/** Earlier and later rows of a table that the server pages. */
export function Pages({ page, pageSize, total, setPage }: PagesProps) {
  const last = Math.max(1, Math.ceil(total / pageSize));
  if (last === 1) return null;
  const from = (page - 1) * pageSize + 1;
  return (
    <nav className="no-print mt-3 flex flex-wrap items-center gap-4" aria-label={words.table.more}>
      <Button isDisabled={page <= 1} onPress={() => setPage(page - 1)}>
        {words.table.previousPage}
      </Button>
      <Button isDisabled={page >= last} onPress={() => setPage(page + 1)}>
        {words.table.nextPage}
      </Button>
      <span>{words.table.page(from, Math.min(total, page * pageSize), total)}</span>
    </nav>
  );
}
