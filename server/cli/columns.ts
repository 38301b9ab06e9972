/** Label, figure, unit and what else there is to say; a figure that does not exist is a dash. */
export type Row = readonly [label: string, figure: string, unit?: string, note?: string];

/** Blocks of rows, a figure a line, in columns aligned over all blocks. */
export function alignedBlocks(blocks: readonly (readonly Row[])[]): string[] {
  const rows = blocks.flat();
  const widthOf = (column: 0 | 1 | 2) => Math.max(...rows.map((row) => (row[column] ?? '').length));
  const [label, figure, unit] = [widthOf(0), widthOf(1), widthOf(2)];
  return blocks.map((block) =>
    block
      .map((row) =>
        [row[0].padEnd(label), row[1].padStart(figure), (row[2] ?? '').padEnd(unit), row[3] ?? '']
          .join('  ')
          .trimEnd(),
      )
      .join('\n'),
  );
}
