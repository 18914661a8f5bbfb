import i18next from 'i18next';
import { initReactI18next } from 'react-i18next';
import english from '../messages/en.json' with { type: 'json' };

/** Starts the words of the page with those that every page needs; messages/beyond-sheet.ts adds the others. Another language is files beside these. */
export async function startWords(): Promise<void> {
  await i18next.use(initReactI18next).init({
    lng: 'en',
    fallbackLng: 'en',
    resources: { en: { translation: english } },
    // React escapes what it writes; escaping twice would show &amp; in names.
    interpolation: { escapeValue: false },
    showSupportNotice: false,
  });
}
