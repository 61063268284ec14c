import { useState } from 'react';
import type { MemberView } from '../../../api/contracts/members.ts';
import { Dialog } from '../../components/dialog.tsx';
import { notify } from '../../components/notices.tsx';
import { words } from '../../words/en.ts';
import { DutiesFields } from './duties-fields.tsx';
import { dutiesInWords } from './duties-in-words.ts';
import { useChangeMember } from './queries.ts';

const text = words.members;

type ChangeMemberDialogProps = {
  study: string;
  member: MemberView;
  sites: readonly { id: string; code: string; name: string }[];
  onClose: () => void;
};

export function ChangeMemberDialog({ study, member, sites, onClose }: ChangeMemberDialogProps) {
  const change = useChangeMember(study);
  const [duties, setDuties] = useState({
    roles: member.roles,
    chair: member.chair,
    siteIds: member.sites.map(({ id }) => id),
  });
  const needsSite = duties.roles.includes('coordinator') && duties.siteIds.length === 0;

  return (
    <Dialog
      open
      onClose={onClose}
      heading={text.changeOf(member.name)}
      what={
        <>
          <p>{text.heldNow(dutiesInWords(member))}</p>
          <p>{text.changeWhat}</p>
        </>
      }
      act={text.changeAct}
      ready={duties.roles.length > 0 && !needsSite}
      onAct={async () => {
        await change.mutateAsync({ id: member.id, ...duties, version: member.version });
        notify(text.changed(member.name));
      }}
    >
      <DutiesFields
        sites={sites}
        value={duties}
        onChange={setDuties}
        errors={needsSite ? { siteIds: text.needsSite } : {}}
      />
    </Dialog>
  );
}
