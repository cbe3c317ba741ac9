/** Plain text tables: a heading, rows, columns as wide as their longest cell; words to the left, figures to the right. */

export function table(heading: readonly string[], rows: readonly (readonly string[])[], wordColumns = 1): string {
  const all = [heading, ...rows];
  const widths = heading.map((_, column) => Math.max(...all.map((row) => (row[column] ?? "").length)));
  const line = (row: readonly string[]): string =>
    widths
      .map((width, column) => {
        const cell = row[column] ?? "";
        return column < wordColumns ? cell.padEnd(width) : cell.padStart(width);
      })
      .join("   ")
      .trimEnd();
  return all.map((row) => `  ${line(row)}`).join("\n");
}
