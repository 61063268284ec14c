/** What the marks of the spaghetti plot mean, drawn as the marks are. */
import type { ReactNode } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { type DrawAs, FEW_SUBJECTS, type SpaghettiData } from './types.ts';

const words = chartsWords.spaghetti;

export function Key({ data, as, ribbons }: { data: SpaghettiData; as: DrawAs; ribbons: boolean }) {
  const ended = data.subjects.filter((subject) => subject.ended).length;
  const fades = data.lines.some((line) =>
    line.points.some((point) => point.remaining < FEW_SUBJECTS),
  );
  const twos = as === 'own lines' && data.subjects.some((subject) => subject.own?.n === 2);
  const banded = data.lines.some((line) => line.points.some((point) => point.lower !== null));
  return (
    <ul className="mt-2 flex flex-wrap gap-x-6 gap-y-1 text-13 text-faded">
      {ribbons ? (
        <Item words={words.ribbonWords}>
          <rect y={1} width={28} height={16} fill="var(--color-ink)" fillOpacity={0.09} />
          <rect y={5} width={28} height={8} fill="var(--color-ink)" fillOpacity={0.14} />
        </Item>
      ) : (
        <Item words={words.one}>
          <path
            d="M0 12 L10 6 L20 11 L28 5"
            fill="none"
            stroke="var(--color-ink)"
            strokeOpacity={0.5}
          />
        </Item>
      )}
      {banded && (
        <Item words={`${data.lineName}, ${words.band}`}>
          <rect y={3} width={28} height={12} fill="var(--color-kelp)" fillOpacity={0.22} />
          <line x2={28} y1={9} y2={9} stroke="var(--color-kelp)" strokeWidth={3} />
        </Item>
      )}
      {ended > 0 && !ribbons && (
        <Item words={words.ended(ended)}>
          <line x2={14} y1={9} y2={9} stroke="var(--color-ink)" strokeOpacity={0.5} />
          <line x1={14} x2={14} y1={4} y2={14} stroke="var(--color-ink)" strokeWidth={1.75} />
        </Item>
      )}
      {twos && (
        <Item words={words.twoReadings}>
          <line x2={28} y1={9} y2={9} stroke="var(--color-ink)" strokeDasharray="5 4" />
        </Item>
      )}
      {fades && (
        <Item words={words.few(data.lineName)}>
          <line x2={14} y1={9} y2={9} stroke="var(--color-kelp)" strokeWidth={3} />
          <line
            x1={14}
            x2={28}
            y1={9}
            y2={9}
            stroke="var(--color-kelp)"
            strokeOpacity={0.35}
            strokeWidth={3}
          />
        </Item>
      )}
    </ul>
  );
}

function Item({ words: text, children }: { words: string; children: ReactNode }) {
  return (
    <li className="flex items-center gap-2">
      <svg width={28} height={18} aria-hidden="true" className="shrink-0">
        {children}
      </svg>
      {text}
    </li>
  );
}
