import { useQuery } from '@tanstack/react-query';
import { useStudy } from '../../app/session.ts';
import { Page } from '../../components/page.tsx';
import { Answer, Forbidden } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { FreezeForm } from './freeze-form.tsx';
import { freezeChoicesQueryOptions } from './queries.ts';

const text = words.cuts;

export function FreezePage() {
  const { study, roles } = useStudy();
  const mayFreeze = roles.includes('analyst');
  const choices = useQuery({ ...freezeChoicesQueryOptions(study.id), enabled: mayFreeze });
  return (
    <Page heading={text.freezeHeading} sentence={text.freezeSentence}>
      {mayFreeze ? (
        <Answer query={choices}>{(data) => <FreezeForm study={study.id} choices={data} />}</Answer>
      ) : (
        <Forbidden sentence={text.freezeForbidden} />
      )}
    </Page>
  );
}
