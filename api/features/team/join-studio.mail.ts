import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { momentInWords, t } from '../mail/words.ts';

interface Invitation {
  by: string;
  name: string;
  studio: { name: string; replyTo: string; timeZone: string };
  address: string;
  until: Date;
}

/** Invites an assistant. */
export function joinStudioMail({ by, name, studio, address, until }: Invitation): WrittenMail {
  return writeMail({
    subject: t('joinStudio.subject', { by, studio: studio.name }),
    studioName: studio.name,
    replyTo: studio.replyTo,
    greeting: t('joinStudio.greeting', { name }),
    paragraphs: [t('joinStudio.what', { by, studio: studio.name })],
    action: { words: t('joinStudio.action', { studio: studio.name }), address },
    after: [t('joinStudio.until', { until: momentInWords(until, studio.timeZone) })],
    why: t('joinStudio.why', { by }),
  });
}
