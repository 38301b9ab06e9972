/** Letters that have no decomposition in Unicode (UAX #15) but are read as these. */
const readAs: Readonly<Record<string, string>> = {
  ß: 'ss',
  æ: 'ae',
  œ: 'oe',
  ø: 'o',
  đ: 'd',
  ð: 'd',
  ħ: 'h',
  ı: 'i',
  ł: 'l',
  ŋ: 'n',
  þ: 'th',
};

/** Text without case, accents and forms of presentation: what is looked for and what addresses are made of. */
export const plainText = (text: string): string =>
  text
    .normalize('NFKD')
    .toLowerCase()
    .normalize('NFKD')
    .replace(/\p{M}+/gu, '')
    .replace(/[ßæœøđðħıłŋþ]/g, (letter) => readAs[letter]);
