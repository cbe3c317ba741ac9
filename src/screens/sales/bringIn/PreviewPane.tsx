/** What would come of every row of the file: counts that add up, and the rows that would not be taken in, with their reasons. */
import { useState } from "react";
import type { ImportPreview } from "../../../contract/requests.ts";
import { formatNumber } from "../../../domain/format.ts";
import type { DuplicateRow, HeldBackRow } from "../../../domain/importRecord.ts";
import { SectionHeading, Sentence, TextLink } from "../../parts/index.ts";
import evidence from "../EvidencePane.module.css";
import css from "./BringIn.module.css";

/** How many rows of a list stand open at first. */
const FEW = 12;

function counted(count: number, one: string, many: string): string {
  return `${formatNumber(count)} ${count === 1 ? one : many}`;
}

export function PreviewPane({ preview }: { preview: ImportPreview }) {
  const { read, accepted, heldBack, duplicates, blankRows } = preview;
  return (
    <>
      <Sentence narrow>
        <strong>{formatNumber(accepted)}</strong> of {counted(read, "row", "rows")} can be taken in
        {heldBack.length === 0 ? "" : `; ${counted(heldBack.length, "is", "are")} held back, to be mended or left out`}
        {duplicates.length === 0
          ? ""
          : `; ${counted(duplicates.length, "is a sale", "are sales")} that the register has already`}
        .
      </Sentence>
      <dl className={evidence.counts}>
        <div>
          <dt>{formatNumber(accepted)}</dt>
          <dd>taken in</dd>
        </div>
        <div>
          <dt>+{formatNumber(heldBack.length)}</dt>
          <dd>held back, each with its reason</dd>
        </div>
        <div>
          <dt>+{formatNumber(duplicates.length)}</dt>
          <dd>the same sale again, not taken in twice</dd>
        </div>
        <div>
          <dt>{formatNumber(read)}</dt>
          <dd>
            rows read{blankRows === 0 ? "" : `; ${counted(blankRows, "blank row does", "blank rows do")} not count`}
          </dd>
        </div>
      </dl>
      {heldBack.length === 0 ? null : (
        <Rows heading={`${counted(heldBack.length, "row", "rows")} would be held back`} count={heldBack.length}>
          {(most) => heldBack.slice(0, most).map((row) => <HeldBack key={row.row} row={row} />)}
        </Rows>
      )}
      {duplicates.length === 0 ? null : (
        <Rows heading={counted(duplicates.length, "duplicate", "duplicates")} count={duplicates.length}>
          {(most) => duplicates.slice(0, most).map((row) => <Duplicate key={row.row} row={row} />)}
        </Rows>
      )}
    </>
  );
}

interface RowsProps {
  readonly heading: string;
  readonly count: number;
  readonly children: (most: number) => React.ReactNode;
}

function Rows({ heading, count, children }: RowsProps) {
  const [most, setMost] = useState(FEW);
  return (
    <section className={evidence.section}>
      <SectionHeading>{heading}</SectionHeading>
      <ul className={`${evidence.held} ${css.rows}`}>{children(most)}</ul>
      {count > most ? <TextLink onPress={() => setMost(most + 100)}>{formatNumber(count - most)} more</TextLink> : null}
    </section>
  );
}

function HeldBack({ row }: { row: HeldBackRow }) {
  return (
    <li>
      <span className={evidence.number}>row {row.row}</span>
      <div>
        {row.reasons.map(({ column, value, reason, suggestion }) => (
          <div key={`${column} ${reason}`}>
            <b className={evidence.raw}>{value === null || value === "" ? "empty" : value}</b>{" "}
            <span className="soft">{column ?? ""}</span>
            <div>
              {reason}
              {suggestion === null ? "" : ` Could be read as ${suggestion}.`}
            </div>
          </div>
        ))}
      </div>
    </li>
  );
}

function Duplicate({ row }: { row: DuplicateRow }) {
  const { sameAs, why } = row;
  const other = "row" in sameAs ? `row ${sameAs.row} of this file` : `sale ${sameAs.reference ?? sameAs.saleId}`;
  return (
    <li>
      <span className={evidence.number}>row {row.row}</span>
      <div>
        <b className={evidence.raw}>{Object.values(row.cells).slice(0, 3).join(" · ")}</b>
        <div>
          {why}: {other}
        </div>
      </div>
    </li>
  );
}
