/** Light, dark, or what the system says. Kept on the device too, for the sign-in page. */
export type Theme = 'system' | 'light' | 'dark';

const KEPT = 'tetherline.theme';
const systemDark = window.matchMedia('(prefers-color-scheme: dark)');
let chosen: Theme = readKept();

function readKept(): Theme {
  const kept = localStorage.getItem(KEPT);
  return kept === 'light' || kept === 'dark' ? kept : 'system';
}

function show(): void {
  const dark = chosen === 'dark' || (chosen === 'system' && systemDark.matches);
  document.documentElement.dataset.theme = dark ? 'dark' : 'light';
}

export function applyTheme(theme: Theme): void {
  chosen = theme;
  localStorage.setItem(KEPT, theme);
  show();
}

/** Once, before the first page is drawn. */
export function startTheme(): void {
  show();
  systemDark.addEventListener('change', show);
}
