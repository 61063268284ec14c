/** The stamp that travels with every number, picture and file of an ordinary fit of repeated readings. */
export function Stamp({ text }: { text: string }) {
  return (
    <strong className="inline-block border-[1.5px] border-flare-ink px-2 py-0.5 text-15 font-semibold text-flare-ink">
      {text}
    </strong>
  );
}
