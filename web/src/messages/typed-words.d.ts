import 'i18next';
import type beyondSheet from './en-beyond-sheet.json';
import type english from './en.json';

declare module 'i18next' {
  interface CustomTypeOptions {
    defaultNS: 'translation';
    resources: { translation: typeof english & typeof beyondSheet };
  }
}
