import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { MailContent } from '../../../../api/contract/mail.ts';
import { formatTime } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { TitleBlock } from '../../ui/title-block.tsx';
import { MailStateWord } from './mail-state.tsx';
import { mailQuery, useMailDeed } from './queries.ts';

/** One mail as it looks to the person who gets it, and what can still be done about it. */
export function MailDialog({ id, onClose }: { id: string; onClose: () => void }) {
  const mail = useQuery(mailQuery(id));
  return (
    <Dialog open wide title={mail.data?.subject ?? 'Mail'} onClose={onClose} actions={mail.data ? <Deeds mail={mail.data} /> : null}>
      <QueryView query={mail}>{(content) => <Content mail={content} />}</QueryView>
    </Dialog>
  );
}

function Content({ mail }: { mail: MailContent }) {
  const [form, setForm] = useState<'html' | 'text'>('html');
  return (
    <div className="grid gap-4">
      <TitleBlock
        cells={[
          { label: 'State', value: <MailStateWord state={mail.state} /> },
          { label: 'To', value: `${mail.to.name} <${mail.to.address}>`.trim(), share: 2 },
          { label: mail.sentAt ? 'Sent' : 'Written', value: formatTime(mail.sentAt ?? mail.createdAt) },
        ]}
      />
      {mail.problem ? <p className="font-bold text-copper">{mail.problem}</p> : null}
      <div className="flex gap-2" role="group" aria-label="Form">
        {(['html', 'text'] as const).map((each) => (
          <Button
            key={each}
            size="small"
            aria-pressed={form === each}
            tone={form === each ? 'first' : 'plain'}
            onClick={() => setForm(each)}
          >
            {each === 'html' ? 'As it looks' : 'Plain text'}
          </Button>
        ))}
      </div>
      {form === 'html' ? (
        // Without any allowance the frame runs no script, follows no link and reaches nothing of the page.
        <iframe title="The mail as it looks" sandbox="" srcDoc={mail.html} className="h-[50dvh] w-full border border-line bg-sheet" />
      ) : (
        <pre tabIndex={0} className="max-h-[50dvh] overflow-auto border border-line p-4 font-sans text-15 whitespace-pre-wrap">
          {mail.text}
        </pre>
      )}
      <p className="text-13 text-mute">The secret part of links is left out here: a link lets in whoever has it.</p>
    </div>
  );
}

function Deeds({ mail }: { mail: MailContent }) {
  const deed = useMailDeed();
  const busy = deed.isPending ? deed.variables.what : undefined;
  if (!mail.can.sendAgain && !mail.can.withdraw) return null;
  return (
    <>
      {mail.state === 'unsure' ? (
        <p className="flex-1 text-13">It may have gone out. Ask the person first, or risk that a second copy comes.</p>
      ) : null}
      {deed.error ? (
        <p role="alert" className="flex-1 font-bold text-copper">
          {deed.error.message}
        </p>
      ) : null}
      {mail.can.withdraw ? (
        <Button tone="danger" busy={busy === 'withdraw'} onClick={() => deed.mutate({ what: 'withdraw', id: mail.id })}>
          Do not send
        </Button>
      ) : null}
      {mail.can.sendAgain ? (
        <Button tone="first" busy={busy === 'send-again'} onClick={() => deed.mutate({ what: 'send-again', id: mail.id })}>
          Send again
        </Button>
      ) : null}
    </>
  );
}
