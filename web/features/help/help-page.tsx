export function HelpPage() {
  return null;
}
