import { useState } from 'react';
import { Button } from '../../components/Button';
import { TextField } from '../../components/TextField';

/** The link of an invitation, shown this once: the server keeps only a hash of what is in it. */
export function InvitationLink({ token, onDone }: { readonly token: string; readonly onDone: () => void }) {
  const [copied, setCopied] = useState<'no' | 'yes' | 'refused'>('no');
  const link = `${window.location.origin}/invitations/${token}`;
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(link);
      setCopied('yes');
    } catch {
      // Browsers refuse on plain http; the field can still be copied by hand.
      setCopied('refused');
    }
  };
  return (
    <div className="border-ink mt-4 space-y-3 border-t-[1.5px] pt-3">
      <TextField
        label="the invitation’s link"
        help="It is shown this once. Send it to them yourself; whoever opens it and signs in joins the lab."
        mono
        readOnly
        value={link}
        onFocus={(event) => event.currentTarget.select()}
      />
      <div className="flex flex-wrap items-center gap-3">
        <Button onClick={() => void copy()}>Copy the link</Button>
        <Button onClick={onDone}>Put it away</Button>
        <span role="status">
          {copied === 'yes' && 'Copied.'}
          {copied === 'refused' &&
            'The browser did not let it be copied. Select the field and copy it by hand.'}
        </span>
      </div>
    </div>
  );
}
