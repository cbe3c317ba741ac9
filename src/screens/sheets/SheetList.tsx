/** Issued sheets, newest first, each with its state in a word and a mark. */
import { formatDay, formatMoney } from "../../domain/format.ts";
import type { SheetRecord } from "../../domain/sheetRecord.ts";
import { EmptyState, SectionHeading } from "../parts/index.ts";
import css from "./Sheets.module.css";

const MARKS: Readonly<Record<SheetRecord["state"], string>> = { issued: "●", withdrawn: "○", superseded: "◇" };

export function SheetList({ sheets, open }: { readonly sheets: readonly SheetRecord[]; readonly open: string }) {
  return (
    <section aria-labelledby="issued-heading">
      <SectionHeading id="issued-heading" aside="newest first">
        Issued sheets
      </SectionHeading>
      {sheets.length === 0 ? (
        <EmptyState sentence="No sheet has been issued yet. Describe an item under Appraise, look at its draft here, and issue it." />
      ) : (
        <ol className={css.list}>
          {sheets.map((sheet) => (
            <li key={sheet.id}>
              <a href={`#/sheets/${sheet.id}`} aria-current={String(sheet.id) === open ? "true" : undefined}>
                <span className={css.listHead}>
                  <b>{sheet.title}</b>
                  <span className="money">{formatMoney(sheet.amount, sheet.currencyCode)}</span>
                </span>
                <span className="fine soft">
                  <span className={css[sheet.state]} aria-hidden="true">
                    {MARKS[sheet.state]}
                  </span>{" "}
                  {sheet.number} · {sheet.state} · {formatMoney(sheet.low, sheet.currencyCode)}–
                  {formatMoney(sheet.high, sheet.currencyCode)} · at {formatDay(sheet.effectiveOn)} · edition{" "}
                  {sheet.editionNumber}
                </span>
              </a>
            </li>
          ))}
        </ol>
      )}
    </section>
  );
}
