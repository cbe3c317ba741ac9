/** The cells of a held-back row, to be mended in place: first those at fault, the rest when asked for. */
import { useState } from "react";
import type { StoredHeldBackRow } from "../../domain/importRecord.ts";
import { Button, TextLink } from "../parts/index.ts";
import css from "./EvidencePane.module.css";

export interface MendRowProps {
  readonly row: StoredHeldBackRow;
  readonly isBusy: boolean;
  readonly onMend: (cells: Record<string, string>) => void;
  readonly onCancel: () => void;
}

/** Headings at fault, in the order of the file; all of them when no single cell is. */
export function headingsAtFault(row: Pick<StoredHeldBackRow, "cells" | "reasons">): string[] {
  const headings = Object.keys(row.cells);
  const faulty = new Set(row.reasons.map(({ column }) => column));
  const found = headings.filter((heading) => faulty.has(heading));
  return found.length === 0 || faulty.has(null) ? headings : found;
}

export function MendRow({ row, isBusy, onMend, onCancel }: MendRowProps) {
  const [changed, setChanged] = useState<Record<string, string>>({});
  const [isWhole, setWhole] = useState(false);
  const faulty = headingsAtFault(row);
  const headings = isWhole ? Object.keys(row.cells) : faulty;
  return (
    <form
      className={css.mend}
      onSubmit={(event) => {
        event.preventDefault();
        onMend(changed);
      }}
      onKeyDown={(event) => {
        if (event.key === "Escape") onCancel();
      }}
    >
      <div className={css.cells}>
        {headings.map((heading, at) => (
          <label key={heading}>
            <span>{heading}</span>
            <input
              // biome-ignore lint/a11y/noAutofocus: the cells were called for by the click just before
              autoFocus={at === 0}
              value={changed[heading] ?? row.cells[heading] ?? ""}
              onChange={(event) => setChanged({ ...changed, [heading]: event.target.value })}
            />
          </label>
        ))}
      </div>
      <div className={css.acts}>
        <Button type="submit" primary disabled={isBusy || Object.keys(changed).length === 0}>
          Bring this row in
        </Button>
        <Button onClick={onCancel}>Cancel</Button>
        {faulty.length < Object.keys(row.cells).length && !isWhole ? (
          <TextLink onPress={() => setWhole(true)}>all its cells</TextLink>
        ) : null}
      </div>
    </form>
  );
}
