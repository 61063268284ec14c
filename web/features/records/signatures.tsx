import { useState } from 'react';
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { useMe, useStudy } from '../../app/session.ts';
import { Button } from '../../components/button.tsx';
import { formatMoment } from '../../components/dates.ts';
import { Hash } from '../../components/hash.tsx';
import { notify } from '../../components/notices.tsx';
import { Section } from '../../components/page.tsx';
import { ScrollBox } from '../../components/scroll-box.tsx';
import { SigningDialog } from '../../components/signing-dialog.tsx';
import { words } from '../../words/en.ts';
import { useSignRecord } from './queries.ts';

const text = words.records;
const names = text.signature;

export function Signatures({ record }: { record: RecordDetail }) {
  const { study } = useStudy();
  const { account } = useMe();
  const [open, setOpen] = useState(false);
  const sign = useSignRecord(study.id, record.id);
  return (
    <Section heading={text.signaturesHeading}>
      {record.signatures.length === 0 ? (
        <p className="text-faded">{text.unsigned}</p>
      ) : (
        <SignatureTable signatures={record.signatures} />
      )}
      {record.mayBeSignedByMe ? (
        <Button weight="filled" className="no-print mt-4" onPress={() => setOpen(true)}>
          {text.sign}
        </Button>
      ) : null}
      <SigningDialog
        open={open}
        onClose={() => setOpen(false)}
        heading={text.signHeading}
        what={<p>{text.signWhat}</p>}
        act={text.sign}
        name={account.name}
        contentSha256={record.contentSha256}
        meanings={text.meanings.map((meaning) => ({ value: meaning, label: meaning }))}
        onSign={async (signature) => {
          await sign.mutateAsync({ ...signature, contentSha256: record.contentSha256 });
          notify(text.signed);
        }}
      />
    </Section>
  );
}

function SignatureTable({ signatures }: Pick<RecordDetail, 'signatures'>) {
  return (
    <ScrollBox label={text.signaturesCaption}>
      <table className="table" aria-label={text.signaturesCaption}>
        <thead>
          <tr>
            <th scope="col">{names.name}</th>
            <th scope="col">{names.at}</th>
            <th scope="col">{names.meaning}</th>
            <th scope="col">{names.hash}</th>
            <th scope="col">{names.holds}</th>
          </tr>
        </thead>
        <tbody>
          {signatures.map((signature) => (
            <tr key={`${signature.name} ${signature.at} ${signature.meaning}`}>
              <th scope="row">{signature.name}</th>
              <td className="whitespace-nowrap">
                <time dateTime={signature.at}>{formatMoment(signature.at, signature.zone)}</time>
              </td>
              <td>{signature.meaning}</td>
              <td className="min-w-72 py-2">
                <Hash value={signature.contentSha256} />
              </td>
              <td className={signature.valid ? undefined : 'font-semibold text-stop'}>
                {signature.valid ? text.signatureValid : text.signatureBroken}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </ScrollBox>
  );
}
