import i18next from 'i18next';
import words from './en-beyond-sheet.json' with { type: 'json' };

// The sheet, the heaviest page of a guest, is loaded without the words of the others: each of them imports this file.
i18next.addResourceBundle('en', 'translation', words, true);
