/** Letters that don't come apart into a plain letter and its accent. */
const spelled: Readonly<Record<string, string>> = {
  ß: 'ss',
  æ: 'ae',
  Æ: 'AE',
  ø: 'o',
  Ø: 'O',
  ł: 'l',
  Ł: 'L',
  µ: 'u',
  μ: 'u',
  '°': ' deg ',
  '×': ' x ',
  '−': '-',
  '–': '-',
  '—': '-',
  '’': "'",
  '‘': "'",
  '“': '"',
  '”': '"',
  '„': '"',
};

/**
 * The text in printable ASCII on one line, for files whose readers agree on nothing more: accents dropped, what can't be spelled
 * becomes a question mark.
 */
export const plainText = (text: string): string =>
  Array.from(text, (letter) => spelled[letter] ?? letter)
    .join('')
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/\s+/g, ' ')
    .replace(/[^\x20-\x7e]/gu, '?')
    .trim();

/** The plain text in lines of at most `width` characters, broken at spaces where there are any. */
export function plainLines(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  const words = plainText(text)
    .split(' ')
    .flatMap((word) => word.match(new RegExp(`.{1,${width}}`, 'g')) ?? []);
  for (const word of words) {
    if (line !== '' && line.length + 1 + word.length > width) {
      lines.push(line);
      line = word;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  return line === '' ? lines : [...lines, line];
}
