/**
 * The light theme in figures, for files: viewers outside a browser read neither our properties nor OKLCH.
 * A test holds these against web/styles/tokens.css.
 */
export const PALETTE: Readonly<Record<string, string>> = {
  surface: '#f6fbfb',
  panel: '#ffffff',
  ink: '#0e222a',
  faded: '#4e6167',
  line: '#cddbdb',
  edge: '#738487',
  kelp: '#196958',
  flare: '#bc541a',
  'flare-ink': '#903a03',
  stop: '#ae0440',
  'code-1': '#286cab',
  'code-2': '#9a4c95',
  'code-3': '#647520',
};
