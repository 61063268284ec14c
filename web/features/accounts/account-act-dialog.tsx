import { useState } from 'react';
import type { AccountView, IssuedAccount } from '../../../api/contracts/accounts.ts';
import { Dialog } from '../../components/dialog.tsx';
import { notify } from '../../components/notices.tsx';
import { TextAreaField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import { useResetAccount, useSetAccountOpen } from './queries.ts';

const text = words.accounts;
const REASON_LEAST = 5;
export type AccountAct = 'disable' | 'enable' | 'reset';

const ACTS = {
  disable: { heading: text.disableOf, what: text.disableWhat, act: text.disableAct },
  enable: { heading: text.enableOf, what: text.enableWhat, act: text.enableAct },
  reset: { heading: text.resetOf, what: text.resetWhat, act: text.resetAct },
} as const;

type AccountActDialogProps = {
  kind: AccountAct;
  account: AccountView;
  onClose: () => void;
  onIssued: (issued: IssuedAccount) => void;
};

export function AccountActDialog({ kind, account, onClose, onIssued }: AccountActDialogProps) {
  const reset = useResetAccount();
  const setOpen = useSetAccountOpen();
  const [reason, setReason] = useState('');
  const act = ACTS[kind];

  async function run() {
    const request = { id: account.id, version: account.version, reason };
    if (kind === 'reset') {
      onIssued(await reset.mutateAsync(request));
      return;
    }
    await setOpen.mutateAsync({ ...request, open: kind === 'enable' });
    notify(
      kind === 'enable' ? text.enabledNotice(account.name) : text.disabledNotice(account.name),
    );
  }

  return (
    <Dialog
      open
      onClose={onClose}
      heading={act.heading(account.name)}
      what={<p>{act.what}</p>}
      act={act.act}
      ready={reason.trim().length >= REASON_LEAST}
      onAct={run}
    >
      <TextAreaField
        label={text.reason}
        hint={text.reasonHint}
        value={reason}
        onChange={setReason}
        rows={2}
      />
    </Dialog>
  );
}
