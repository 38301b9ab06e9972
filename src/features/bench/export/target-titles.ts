/** Titles of the targets, here so that the targets themselves load with the panel. */
export const targetTitles: Readonly<Record<string, string>> = {
  c99: 'C99 header and source',
  avr: 'AVR program memory and playback',
  cpp17: 'C++17 header of constexpr arrays',
  'cortex-m': 'Cortex-M C source with SysTick playback',
  riscv: 'RISC-V C source with machine timer playback',
  asm: 'GNU assembler source and C header',
  rust: 'Rust module without std',
  python: 'Python module of bytes',
  'verilog-memh': 'Verilog memory image for $readmemh',
  'intel-hex': 'Intel HEX image',
  binary: 'Binary image',
  csv: 'CSV for spreadsheets and scripts',
  json: 'JSON with definition, codes and words',
  wav: 'WAV sound of the codes',
};
