export function FindSubject({ study }: { study: string }) {
  return <span>{study}</span>;
}
