import { useState } from 'react';
import type { StudioOpenLink } from '../../../../api/contract/studio-open-link.ts';
import type { StudioSheet } from '../../../../api/contract/sheets.ts';
import { formatDay } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import { useSheetDeed } from './mutations.ts';
import { OpenLinkDialog } from './open-link-dialog.tsx';
import { counted } from './sheet-words.ts';

/** The link by which whoever has it may look at an issued sheet: its address, what it asks for, and the way to withdraw it. */
export function OpenLinkPanel({ sheet }: { sheet: StudioSheet }) {
  const [dialog, setDialog] = useState<'terms' | 'withdraw' | null>(null);
  const { openLink: link, can } = sheet;
  if (!link && !can.openLink) return null;
  return (
    <section aria-labelledby="open-link-of-sheet" className="border border-ink bg-sheet px-4.5 py-4 max-lg:md:col-span-2">
      <div className="flex flex-wrap items-center justify-between gap-2">
        <h2 id="open-link-of-sheet" className="text-17">
          Open link
        </h2>
        <span className={link && !link.hasEnded ? 'lettering text-verdigris' : 'lettering'}>
          {link ? (link.hasEnded ? 'ended' : 'on') : 'off'}
        </span>
      </div>
      <p className="mt-1 text-13 text-mute">
        Whoever has it may look. Before marking anything they give their name and confirm an e-mail address; they are then listed under
        People.
      </p>
      {link ? <LinkFacts sheet={sheet} link={link} /> : null}
      <p className="mt-3 flex flex-wrap gap-2">
        {can.openLink ? (
          <Button size="small" onClick={() => setDialog('terms')}>
            {link ? 'Change' : 'Switch on'}
          </Button>
        ) : null}
        {link ? (
          <Button size="small" tone="danger" onClick={() => setDialog('withdraw')}>
            Withdraw
          </Button>
        ) : null}
      </p>
      {dialog === 'terms' ? <OpenLinkDialog sheet={sheet} onClose={() => setDialog(null)} /> : null}
      {dialog === 'withdraw' && link ? <WithdrawDialog sheet={sheet} link={link} onClose={() => setDialog(null)} /> : null}
    </section>
  );
}

function LinkFacts({ sheet, link }: { sheet: StudioSheet; link: StudioOpenLink }) {
  const { address } = link;
  // The sheet's last date may have been set earlier since.
  const ownDay = link.endsOn !== null && (!sheet.chooseBy || link.endsOn < sheet.chooseBy);
  const ends = ownDay ? link.endsOn : sheet.chooseBy;
  const copy = (words: string) =>
    navigator.clipboard.writeText(words).then(
      () => showNotice('The link is copied.'),
      () => showNotice('The browser did not let it be copied. Select the address and copy it by hand.', { tone: 'problem' }),
    );
  return (
    <>
      {address ? (
        <div className="mt-3 flex">
          <TextInput
            readOnly
            aria-label="Address of the open link"
            className="min-w-0 flex-1 text-13"
            value={address}
            onFocus={(event) => event.target.select()}
          />
          <Button className="-ml-px border-grey" aria-label="Copy the open link" onClick={() => void copy(address)}>
            Copy
          </Button>
        </div>
      ) : (
        <p className="mt-3 font-bold text-copper">
          Its address cannot be read any more, since the secret of this installation was changed. It still works for whoever has it; for an
          address to hand on, withdraw it and switch it on again.
        </p>
      )}
      <dl className="mt-3 grid grid-cols-[auto_1fr] gap-x-4 gap-y-1 text-13">
        <dt className="text-mute">Passphrase</dt>
        <dd>{link.hasPassphrase ? 'asked for' : 'none'}</dd>
        <dt className="text-mute">Last day</dt>
        <dd>
          {ends ? formatDay(ends) : 'none'}
          {ownDay ? '' : ', with the sheet'}
        </dd>
        <dt className="text-mute">Looking</dt>
        <dd>{link.lookers === 0 ? 'nobody at present' : counted(link.lookers, 'browser')}</dd>
      </dl>
    </>
  );
}

function WithdrawDialog({ sheet, link, onClose }: { sheet: StudioSheet; link: StudioOpenLink; onClose: () => void }) {
  const deed = useSheetDeed(sheet);
  const came = sheet.guests.filter((guest) => guest.byOpenLink && !guest.withdrawnAt).length;
  const withdraw = () =>
    deed.mutate(
      { what: 'withdraw-open-link' },
      {
        onSuccess: () => {
          showNotice('The open link is withdrawn. Its address opens nothing more.');
          onClose();
        },
      },
    );
  return (
    <ConfirmDialog
      open
      title="Withdraw the open link"
      confirm="Withdraw it"
      busy={deed.isPending}
      error={deed.error?.message}
      onClose={onClose}
      onConfirm={withdraw}
    >
      <p>
        Its address stops working at once and for good; a link that you switch on later has another one.
        {link.lookers > 0
          ? ` ${counted(link.lookers, 'browser')} that ${link.lookers === 1 ? 'looks' : 'look'} by it will see nothing more.`
          : ''}
      </p>
      {came > 0 ? (
        <p className="mt-3">
          {counted(came, 'person', 'people')} who came by it and confirmed an address {came === 1 ? 'stays' : 'stay'} on the sheet. Their
          links can be taken back under People.
        </p>
      ) : null}
    </ConfirmDialog>
  );
}
