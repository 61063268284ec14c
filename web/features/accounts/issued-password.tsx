import type { IssuedAccount } from '../../../api/contracts/accounts.ts';
import { Dialog } from '../../components/dialog.tsx';
import { words } from '../../words/en.ts';

const text = words.accounts;

/** A temporary password, shown once. */
export function IssuedPassword({
  issued,
  onClose,
}: {
  issued: IssuedAccount;
  onClose: () => void;
}) {
  return (
    <Dialog
      open
      onClose={onClose}
      heading={text.issuedHeading(issued.account.name)}
      what={
        <>
          <p className="figure border-y border-line py-3 text-21 break-all select-all">
            {issued.temporaryPassword}
          </p>
          <p>{text.issuedWhat}</p>
          <p>{issued.letterSent ? text.letterSent : text.noLetter}</p>
        </>
      }
      act={text.issuedDone}
      onAct={() => undefined}
      noCancel
    />
  );
}
