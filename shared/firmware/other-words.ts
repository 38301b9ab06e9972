// Keywords of the other languages that a table is exported to: one name serves a wave in all of them.

const wordsIn = (text: string) => new Set(text.trim().split(/\s+/));

/** The Rust Reference, "Keywords": strict, reserved and weak ones, in all editions to 2024. */
export const rustKeywords: ReadonlySet<string> = wordsIn(`
  as break const continue crate else enum extern false fn for if impl in let loop match mod move mut pub ref return
  self Self static struct super trait true type unsafe use where while async await dyn abstract become box do final
  macro override priv typeof unsized virtual yield try gen union macro_rules raw safe
`);

/** The Python Language Reference §2.3.1, §2.3.2: keywords and soft keywords. */
export const pythonKeywords: ReadonlySet<string> = wordsIn(`
  False None True and as assert async await break class continue def del elif else except finally for from global if
  import in is lambda nonlocal not or pass raise return try while with yield match case type
`);
