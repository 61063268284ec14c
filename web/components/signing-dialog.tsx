import { type ReactNode, useState } from 'react';
import { words } from '../words/en.ts';
import { Dialog } from './dialog.tsx';
import { Hash } from './hash.tsx';
import { Facts } from './page.tsx';
import { RadioGroup } from './radio-group.tsx';
import { TextField } from './text-field.tsx';

type SigningDialogProps<Meaning extends string> = {
  open: boolean;
  onClose: () => void;
  heading: string;
  what: ReactNode;
  act: string;
  /** The name as it will be printed. */
  name: string;
  contentSha256: string;
  meanings: readonly { value: Meaning; label: string }[];
  onSign: (signature: { meaning: Meaning; password: string }) => Promise<unknown>;
};

/** Signing: who, when, what it means, the password again, and the hash it is bound to. */
export function SigningDialog<Meaning extends string>(props: SigningDialogProps<Meaning>) {
  const [meaning, setMeaning] = useState('');
  const [password, setPassword] = useState('');
  const chosen = props.meanings.find((each) => each.value === meaning);

  function close() {
    setPassword('');
    setMeaning('');
    props.onClose();
  }

  return (
    <Dialog
      open={props.open}
      onClose={close}
      heading={props.heading}
      what={props.what}
      act={props.act}
      ready={chosen !== undefined && password !== ''}
      onAct={() => (chosen ? props.onSign({ meaning: chosen.value, password }) : Promise.resolve())}
    >
      <Facts
        facts={[
          [words.signing.name, props.name],
          [words.signing.time, words.signing.timeNow],
          [words.signing.content, <Hash key="hash" value={props.contentSha256} />],
        ]}
      />
      <RadioGroup
        label={words.signing.meaning}
        value={meaning}
        onChange={setMeaning}
        choices={props.meanings}
      />
      <TextField
        label={words.signing.password}
        hint={words.signing.passwordHint}
        type="password"
        autoComplete="current-password"
        value={password}
        onChange={setPassword}
        width={28}
      />
    </Dialog>
  );
}
