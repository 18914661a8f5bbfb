import { useTranslation } from 'react-i18next';
import type { GuestProof, GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import type { Person } from '../marks/read-marks.ts';
import { shotFacts } from './as-shot.ts';
import { FitForUse } from './fit-for-use.tsx';
import { PanelLine, PanelSection } from './panel-section.tsx';

interface Props {
  proof: GuestProof;
  uses: GuestSheet['uses'];
  askedFor: string;
  /** Everybody who marked it, oneself included. */
  people: Person[];
  me: string;
}

/** Beside the picture: what was asked for, what it is good for, who marked it, and how it was shot. */
export function ProofPanel({ proof, uses, askedFor, people, me }: Props) {
  const { t } = useTranslation();
  return (
    <div className="grid content-start gap-5 text-13">
      {askedFor ? (
        <PanelSection title={t('viewer.askedFor')}>
          <p>{askedFor}</p>
        </PanelSection>
      ) : null}
      <FitForUse picture={proof} uses={uses} />
      <PanelSection title={t('viewer.markedBy')}>
        {people.length === 0 ? <p className="text-mute">{t('viewer.nobody')}</p> : null}
        <ul>
          {people.map((person) => (
            <li key={person.accountId} className="flex justify-between border-b border-hair py-1">
              <span>{person.accountId === me ? t('viewer.you', { name: person.name }) : person.name}</span>
              <span className={person.role === 'lead' ? 'font-bold text-copper' : 'text-mute'}>
                {t(person.role === 'lead' ? 'viewer.picks' : 'viewer.reviews')}
              </span>
            </li>
          ))}
        </ul>
      </PanelSection>
      <AsShot proof={proof} />
    </div>
  );
}

function AsShot({ proof }: { proof: GuestProof }) {
  const { t } = useTranslation();
  const facts = shotFacts(proof, (fastest, slowest) => t('shot.range', { fastest, slowest }));
  if (facts.length === 0) return null;
  return (
    <PanelSection title={t('viewer.asShot')}>
      <dl>
        {facts.map(({ fact, says }) => (
          <PanelLine key={fact} what={t(`shot.${fact}`)}>
            {says}
          </PanelLine>
        ))}
      </dl>
    </PanelSection>
  );
}
