/** Picks a subject by its code, typed. */
import { type KeyboardEvent, useEffect, useId, useState } from 'react';
import { chartsWords } from '../../words/charts.ts';
import type { Pickable } from './picking.tsx';

const words = chartsWords.spaghetti;

export function PickField(props: {
  order: readonly Pickable[];
  picked: string | null;
  onPick: (id: string | null) => void;
}) {
  const field = useId();
  const list = useId();
  const message = useId();
  const code = props.order.find((each) => each.id === props.picked)?.code ?? '';
  const [text, setText] = useState(code);
  const [unknown, setUnknown] = useState<string | null>(null);
  useEffect(() => {
    setText(code);
    setUnknown(null);
  }, [code]);
  const find = (typed: string) =>
    props.order.find((each) => each.code.toLowerCase() === typed.trim().toLowerCase());
  const onChange = (typed: string) => {
    setText(typed);
    setUnknown(null);
    const found = find(typed);
    if (found) props.onPick(found.id);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Escape') {
      setText('');
      setUnknown(null);
      props.onPick(null);
    }
    if (event.key === 'Enter') {
      event.preventDefault();
      if (text.trim() === '') props.onPick(null);
      else if (!find(text)) setUnknown(words.unknownCode(text.trim()));
    }
  };
  return (
    <div className="flex items-center gap-2">
      <label htmlFor={field}>{words.subject}</label>
      <input
        id={field}
        list={list}
        value={text}
        autoComplete="off"
        spellCheck={false}
        aria-describedby={message}
        aria-invalid={unknown !== null}
        title={words.subjectHint}
        className="control figure w-[12ch] min-h-7 py-0.5"
        onChange={(event) => onChange(event.target.value)}
        onKeyDown={onKeyDown}
      />
      <datalist id={list}>
        {props.order.slice(0, 500).map((each) => (
          <option key={each.id} value={each.code} />
        ))}
      </datalist>
      <span id={message} role="status" className="text-13 text-stop">
        {unknown}
      </span>
    </div>
  );
}
