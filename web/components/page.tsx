import { type ReactNode, useEffect, useRef } from 'react';
import { words } from '../words/en.ts';

type PageProps = {
  /** States the finding or the task. */
  heading: ReactNode;
  /** The same as text where `heading` is not text: the title of the window. */
  title?: string;
  /** One sentence that says what to do. */
  sentence?: ReactNode;
  /** At the right of the heading: the stamp, quiet acts. */
  aside?: ReactNode;
  /** The heading speaks of dependence that matters: a bar in its colour stands before it. */
  warn?: boolean;
  children?: ReactNode;
};

/** A page is a document: its heading, one sentence, then the table or picture at full width. */
export function Page({ heading, title, sentence, aside, warn, children }: PageProps) {
  const headingRef = useRef<HTMLHeadingElement>(null);
  const named = title ?? (typeof heading === 'string' ? heading : words.common.product);

  useEffect(() => {
    document.title = words.common.titleOf(named);
  }, [named]);

  // A change of page is told to those who don't see it.
  useEffect(() => {
    headingRef.current?.focus({ preventScroll: true });
  }, []);

  return (
    <article>
      <header className="mb-6 flex flex-wrap items-start justify-between gap-x-6 gap-y-2">
        <div className={warn ? 'min-w-0 border-l-[6px] border-flare pl-5' : 'min-w-0'}>
          <h1
            ref={headingRef}
            tabIndex={-1}
            className="text-28 font-semibold break-words outline-none"
          >
            {heading}
          </h1>
          {sentence ? <p className="mt-1 max-w-text text-17 text-faded">{sentence}</p> : null}
        </div>
        {aside}
      </header>
      {children}
    </article>
  );
}

/** A part of a page with its own heading. */
export function Section({
  heading,
  sentence,
  aside,
  children,
}: {
  heading: ReactNode;
  sentence?: ReactNode;
  aside?: ReactNode;
  children: ReactNode;
}) {
  return (
    <section className="mt-10">
      <div className="mb-3 flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1">
        <div>
          <h2 className="text-17 font-semibold">{heading}</h2>
          {sentence ? <p className="max-w-text text-faded">{sentence}</p> : null}
        </div>
        {aside}
      </div>
      {children}
    </section>
  );
}

/** Names and values, one pair a line. */
export function Facts({ facts }: { facts: readonly (readonly [string, ReactNode])[] }) {
  return (
    <dl className="grid max-w-full grid-cols-1 narrow:grid-cols-[max-content_1fr]">
      {facts.map(([name, value]) => (
        <div
          key={name}
          className="col-span-full grid border-b border-line py-1.5 narrow:grid-cols-subgrid narrow:gap-x-6"
        >
          <dt className="text-faded">{name}</dt>
          <dd className="min-w-0 break-words">{value}</dd>
        </div>
      ))}
    </dl>
  );
}
