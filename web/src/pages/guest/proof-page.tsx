import { useTranslation } from 'react-i18next';
import { useParams } from 'react-router-dom';
import { SheetDoor } from '../../features/sheets-guest/sheet-door.tsx';
import { ProofViewer } from '../../features/viewer/proof-viewer.tsx';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import '../../messages/beyond-sheet.ts';

/** One proof by itself, on a neutral surround. */
export function Component() {
  const { sheetId = '', number = '' } = useParams();
  return (
    <SheetDoor key={sheetId} sheetId={sheetId}>
      {(data) => {
        const at = data.proofs.findIndex((proof) => String(proof.number) === number);
        return at < 0 ? <NoSuchProof sheetId={sheetId} studio={data.sheet.studio.name} /> : <ProofViewer data={data} at={at} />;
      }}
    </SheetDoor>
  );
}

function NoSuchProof({ sheetId, studio }: { sheetId: string; studio: string }) {
  const { t } = useTranslation();
  return (
    <GuestShell studio={studio}>
      <div className="max-w-xl py-8">
        <PageTitle title={t('viewer.gone')} />
        <p className="mt-3">{t('viewer.goneWhy')}</p>
        <LinkButton to={`/sheets/${sheetId}`} className="mt-6">
          {t('viewer.all')}
        </LinkButton>
      </div>
    </GuestShell>
  );
}
