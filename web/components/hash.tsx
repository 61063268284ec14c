import { words } from '../words/en.ts';
import { Button } from './button.tsx';
import { notify } from './notices.tsx';

/** A SHA-256 in groups of four, so that two people can read it to each other. */
export function Hash({ value, copy = false }: { value: string; copy?: boolean }) {
  // Each with the place where it begins, which tells apart two groups of the same digits.
  const groups = [...value.matchAll(/.{1,4}/g)];
  return (
    <span className="inline-flex max-w-full flex-wrap items-baseline gap-x-3">
      <code className="flex flex-wrap gap-x-[0.75ch] text-13">
        {groups.map((group) => (
          <span key={group.index}>{group[0]}</span>
        ))}
      </code>
      {copy ? (
        <Button
          weight="quiet"
          className="no-print"
          onPress={() => {
            void navigator.clipboard.writeText(value).then(() => notify(words.hash.copied));
          }}
        >
          {words.hash.copy}
        </Button>
      ) : null}
    </span>
  );
}
