import { useState } from 'react';
import type { MemberView } from '../../../api/contracts/members.ts';
import { Dialog } from '../../components/dialog.tsx';
import { notify } from '../../components/notices.tsx';
import { TextAreaField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import { useRemoveMember } from './queries.ts';

const text = words.members;
const REASON_LEAST = 5;

type RemoveMemberDialogProps = { study: string; member: MemberView; onClose: () => void };

export function RemoveMemberDialog({ study, member, onClose }: RemoveMemberDialogProps) {
  const remove = useRemoveMember(study);
  const [reason, setReason] = useState('');

  return (
    <Dialog
      open
      onClose={onClose}
      heading={text.removeHeading(member.name)}
      what={<p>{text.removeWhat}</p>}
      act={text.removeAct}
      ready={reason.trim().length >= REASON_LEAST}
      onAct={async () => {
        await remove.mutateAsync({ id: member.id, reason, version: member.version });
        notify(text.removed(member.name));
      }}
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
