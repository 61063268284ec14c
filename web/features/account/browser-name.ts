/** A browser and its system from the text it sends about itself; the text itself where neither is known. */
const BROWSERS = [
  ['Edg/', 'Edge'],
  ['Firefox/', 'Firefox'],
  ['Chrome/', 'Chrome'],
  ['Safari/', 'Safari'],
] as const;
const SYSTEMS = [
  ['Windows', 'Windows'],
  ['Android', 'Android'],
  ['iPhone', 'iPhone'],
  ['iPad', 'iPad'],
  ['Mac OS', 'macOS'],
  ['CrOS', 'ChromeOS'],
  ['Linux', 'Linux'],
] as const;

export function browserName(agent: string): string {
  const browser = BROWSERS.find(([mark]) => agent.includes(mark))?.[1];
  const system = SYSTEMS.find(([mark]) => agent.includes(mark))?.[1];
  if (!browser) return agent.slice(0, 60);
  return system ? `${browser}, ${system}` : browser;
}
