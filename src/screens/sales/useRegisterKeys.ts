/** The register by keyboard: arrows, PgUp/PgDn, Home/End move; Space picks; Shift with an arrow picks on; V verifies, X sets aside, S sorts by the column under the cursor. */
import { type KeyboardEvent, useCallback } from "react";
import type { Register } from "./useRegister.ts";

export interface RegisterKeysOptions {
  readonly register: Register;
  readonly columnCount: number;
  readonly pageRows: number;
}

export function useRegisterKeys({ register, columnCount, pageRows }: RegisterKeysOptions) {
  return useCallback(
    (event: KeyboardEvent<HTMLElement>): void => {
      if (event.target !== event.currentTarget || event.ctrlKey || event.metaKey || event.altKey) return;
      const { book, cursor, picked, pick, moveTo, ask, sortBy } = register;
      const lastRow = (book.total ?? 0) - 1;
      if (lastRow < 0) return;
      const rows: Readonly<Record<string, number>> = {
        ArrowUp: cursor.row - 1,
        ArrowDown: cursor.row + 1,
        PageUp: cursor.row - pageRows,
        PageDown: cursor.row + pageRows,
        Home: 0,
        End: lastRow,
      };
      const columns: Readonly<Record<string, number>> = { ArrowLeft: cursor.column - 1, ArrowRight: cursor.column + 1 };
      const sale = book.rowAt(cursor.row);
      if (rows[event.key] !== undefined) {
        const row = Math.min(lastRow, Math.max(0, rows[event.key]!));
        if (event.shiftKey && Math.abs(row - cursor.row) === 1) {
          const both = [sale, book.rowAt(row)].filter((one) => one !== null);
          pick(both, true);
        }
        moveTo({ ...cursor, row });
      } else if (columns[event.key] !== undefined) {
        moveTo({ ...cursor, column: Math.min(columnCount - 1, Math.max(0, columns[event.key]!)) });
      } else if (event.key === " " && sale !== null) pick([sale], !picked.has(sale.id));
      else if (event.key.toLowerCase() === "v") ask("verify");
      else if (event.key.toLowerCase() === "x") ask("setAside");
      else if (event.key === "Escape") ask(null);
      else if (event.key.toLowerCase() === "s") sortBy(event.currentTarget.dataset.column ?? "soldOn");
      else return;
      event.preventDefault();
    },
    [register, columnCount, pageRows],
  );
}
