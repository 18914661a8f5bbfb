/** Two letters that stand for a person: of the first and the last word of the name. "Ines Okafor" gives "IO", "Mira" gives "MI". */
export function initials(name: string): string {
  const words = name
    .normalize('NFC')
    .split(/[\s-]+/u)
    .filter((word) => /\p{L}|\p{N}/u.test(word));
  const letters = (word: string) => [...word].filter((letter) => /\p{L}|\p{N}/u.test(letter));
  const [first, last] = [letters(words[0] ?? ''), letters(words.at(-1) ?? '')];
  const pair = words.length > 1 ? [first[0], last[0]] : first.slice(0, 2);
  return pair.join('').toLocaleUpperCase('en') || '·';
}
