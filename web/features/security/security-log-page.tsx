export function SecurityLogPage() {
  return null;
}
