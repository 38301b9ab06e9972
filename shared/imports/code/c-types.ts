import type { WordType } from './code-array.ts';

const unknown: WordType = { typeName: '', wordBits: 0, isSigned: undefined };

/** Names of whole-number types by width: C17 §7.20, C++ and what old firmware calls them. */
const named: readonly (readonly [RegExp, number, boolean])[] = [
  [/^(?:u?int(?:_least)?8_t|[us]8|uint8|int8|sint8|BYTE|byte|uchar|UINT8|INT8|U8|S8|char8_t)$/, 8, false],
  [
    /^(?:u?int(?:_least)?16_t|[us]16|uint16|int16|sint16|WORD|ushort|UINT16|INT16|U16|S16|char16_t)$/,
    16,
    false,
  ],
  [
    /^(?:u?int(?:_least)?32_t|[us]32|uint32|int32|sint32|DWORD|ulong|uint|UINT32|INT32|U32|S32|char32_t)$/,
    32,
    false,
  ],
];
const signedNames = /^(?:int|s|sint|INT|S)(?:_least)?\d/;

/** Words that say nothing about the width. */
const silent =
  /^(?:static|const|volatile|extern|constexpr|constinit|inline|register|auto|thread_local|PROGMEM|__flash|__memx|__code|code|__xdata|__rom|rom|alignas|_Alignas|__attribute__|__aligned|std|array|typedef|struct|class|public|private|protected)$/;

/** What an entry of a declaration's words is; undefined where it is no whole number. */
export function cTypeOf(words: readonly string[]): WordType | undefined {
  const told = words.filter((word) => !silent.test(word));
  const plain = told.filter((word) => /^(?:unsigned|signed|char|short|int|long)$/.test(word));
  const typeName = plain.length > 0 ? plain.join(' ') : (told[0] ?? '');
  if (
    told.some((word) => /^(?:float|double|bool|_Bool|void|wchar_t|__int128|u?int64_t|union|enum)$/.test(word))
  ) {
    return undefined;
  }
  for (const word of told) {
    const known = named.find(([pattern]) => pattern.test(word));
    if (known) return { typeName: word, wordBits: known[1], isSigned: signedNames.test(word) };
  }
  const has = (word: string) => told.includes(word);
  const sign = has('unsigned') ? false : has('signed') ? true : undefined;
  if (has('char')) return { typeName, wordBits: 8, isSigned: sign };
  if (has('short')) return { typeName, wordBits: 16, isSigned: sign ?? true };
  if (told.filter((word) => word === 'long').length > 1) return undefined;
  if (has('int') || has('long') || sign !== undefined)
    return { typeName, wordBits: 32, isSigned: sign ?? true };
  return { ...unknown, typeName };
}
