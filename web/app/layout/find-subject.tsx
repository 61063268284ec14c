import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { ComboBox, Input, Label, ListBox, ListBoxItem, Popover } from 'react-aria-components';
import { useNavigate } from 'react-router-dom';
import { type FoundSubjects, foundSubjectsSchema } from '../../../api/contracts/subjects.ts';
import { words } from '../../words/en.ts';
import { api } from '../api.ts';
import { paths } from '../paths.ts';

const WAIT_MS = 200;

/** The search field of the top bar: a code, or a part of one, opens the subject. */
export function FindSubject({ study }: { study: string }) {
  const [typed, setTyped] = useState('');
  const [code, setCode] = useState('');
  const navigate = useNavigate();

  useEffect(() => {
    const timer = setTimeout(() => setCode(typed.trim()), WAIT_MS);
    return () => clearTimeout(timer);
  }, [typed]);

  const found = useQuery({
    queryKey: ['find-subject', study, code],
    queryFn: ({ signal }) =>
      api(`/api/studies/${study}/find`, { query: { code }, answer: foundSubjectsSchema, signal }),
    enabled: code !== '',
  });
  const rows = code === '' ? [] : (found.data?.rows ?? []);
  return (
    <ComboBox
      items={rows}
      inputValue={typed}
      onInputChange={setTyped}
      value={null}
      onChange={(key) => {
        if (key === null) return;
        setTyped('');
        void navigate(paths.subject(study, String(key)));
      }}
      allowsEmptyCollection
      menuTrigger="input"
    >
      <Label className="sr-only">{words.topBar.findSubjectLabel}</Label>
      <Input
        className="control figure w-[16ch] max-w-full placeholder:font-sans wide:w-[22ch]"
        placeholder={words.topBar.findSubject}
        onKeyDown={(event) => {
          // Enter on a code typed in full opens it without a look at the list.
          const exact = rows.find((row) => row.code.toLowerCase() === typed.trim().toLowerCase());
          if (event.key !== 'Enter' || !exact) return;
          event.preventDefault();
          setTyped('');
          void navigate(paths.subject(study, exact.id));
        }}
      />
      <Popover
        offset={4}
        className="max-h-80 min-w-(--trigger-width) overflow-auto rounded-3 border border-edge bg-panel text-15 text-ink"
      >
        <ListBox<FoundSubjects['rows'][number]>
          className="py-1 outline-none"
          renderEmptyState={() => (
            <p className="px-3 py-1.5 text-13">
              {code === '' || !found.isSuccess ? words.topBar.finding : words.topBar.notFound(code)}
            </p>
          )}
        >
          {(row) => (
            <ListBoxItem
              id={row.id}
              textValue={row.code}
              className="target flex cursor-pointer items-baseline gap-3 px-3 py-1.5 outline-none data-[focused]:bg-kelp/15"
            >
              <span className="figure">{row.code}</span>
              <span className="text-13 text-faded">{row.site.name}</span>
            </ListBoxItem>
          )}
        </ListBox>
      </Popover>
    </ComboBox>
  );
}
