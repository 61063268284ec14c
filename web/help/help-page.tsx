import { Page, Section } from '../components/page.tsx';
import { words } from '../words/en.ts';

const text = words.help;

/** The user guide on one page: it prints as a document and is searched with the browser. */
export function HelpPage() {
  const guides = Object.entries(text.guides);
  return (
    <Page heading={text.heading} sentence={text.sentence}>
      <nav aria-label={text.contents}>
        <ul className="flex flex-wrap gap-x-6 gap-y-1">
          {guides.map(([id, guide]) => (
            <li key={id}>
              <a href={`#${id}`} className="target inline-flex items-center">
                {guide.heading}
              </a>
            </li>
          ))}
        </ul>
      </nav>
      {guides.map(([id, guide]) => (
        <div key={id} id={id} className="scroll-mt-4">
          <Section heading={guide.heading} sentence={guide.sentence}>
            <div className="border-t border-line">
              {guide.parts.map((part) => (
                <section
                  key={part.heading}
                  className="grid gap-x-6 border-b border-line py-3 narrow:grid-cols-[14rem_1fr]"
                >
                  <h3 className="font-semibold">{part.heading}</h3>
                  <ul className="grid max-w-text gap-1">
                    {part.steps.map((step) => (
                      <li key={step}>{step}</li>
                    ))}
                  </ul>
                </section>
              ))}
            </div>
          </Section>
        </div>
      ))}
      <Section heading={text.cautionsHeading}>
        <ul className="grid max-w-text gap-1">
          {text.cautions.map((caution) => (
            <li key={caution}>{caution}</li>
          ))}
        </ul>
      </Section>
    </Page>
  );
}
