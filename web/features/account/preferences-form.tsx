import { useEffect, useState } from 'react';
import type { Me } from '../../../api/contracts/auth.ts';
import { sentenceOf } from '../../app/problem.ts';
import { applyTheme, type Theme } from '../../app/theme.ts';
import { Button } from '../../components/button.tsx';
import { formatMoment } from '../../components/dates.ts';
import { notify } from '../../components/notices.tsx';
import { RadioGroup } from '../../components/radio-group.tsx';
import { words } from '../../words/en.ts';
import { useChangeMe } from './queries.ts';
import { ZoneField } from './zone-field.tsx';

const text = words.account;
const THEMES: readonly Theme[] = ['system', 'light', 'dark'];

/** Theme and zone. A theme is shown at once and kept when it is saved. */
export function PreferencesForm({ account }: { account: Me['account'] }) {
  const [theme, setTheme] = useState<Theme>(account.theme);
  const [timeZone, setTimeZone] = useState(account.timeZone);
  const change = useChangeMe();

  useEffect(() => () => applyTheme(account.theme), [account.theme]);

  return (
    <form
      className="grid grid-cols-[minmax(0,1fr)] justify-items-start gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        change.mutate(
          { theme, timeZone, version: account.version },
          {
            onSuccess: () => notify(text.preferencesSaved),
            onError: (error) => notify(sentenceOf(error), { urgent: true }),
          },
        );
      }}
    >
      <RadioGroup
        label={text.theme}
        value={theme}
        onChange={(value) => {
          const next = THEMES.find((each) => each === value) ?? 'system';
          setTheme(next);
          applyTheme(next);
        }}
        choices={THEMES.map((value) => ({ value, label: text.themes[value] }))}
      />
      <ZoneField
        value={timeZone}
        onChange={setTimeZone}
        reading={text.timeNow(formatMoment(new Date().toISOString(), timeZone))}
      />
      <Button type="submit" isDisabled={change.isPending}>
        {text.savePreferences}
      </Button>
    </form>
  );
}
