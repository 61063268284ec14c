import type { KeyboardEvent } from 'react';

const FOCUSABLE = 'a[href], button:not(:disabled), input:not(:disabled), select:not(:disabled)';

function focusablesOf(row: Element): HTMLElement[] {
  return [...row.querySelectorAll<HTMLElement>(FOCUSABLE)];
}

/** Up, Down, Home and End move between rows, staying in the same column of links or on the row itself. */
export function moveBetweenRows(event: KeyboardEvent<HTMLElement>): void {
  const active = document.activeElement;
  const row = active?.closest('tr[data-row]');
  if (!active || !row || active instanceof HTMLSelectElement) return;
  const rows = [...event.currentTarget.querySelectorAll('tr[data-row]')];
  const at = rows.indexOf(row);
  const to = { ArrowUp: at - 1, ArrowDown: at + 1, Home: 0, End: rows.length - 1 }[event.key];
  const target = to === undefined ? undefined : rows[to];
  if (!target) return;
  event.preventDefault();
  if (active === row) {
    (target as HTMLElement).focus();
    return;
  }
  const place = focusablesOf(row).indexOf(active as HTMLElement);
  const candidates = focusablesOf(target);
  (candidates[place] ?? candidates[0])?.focus();
}
