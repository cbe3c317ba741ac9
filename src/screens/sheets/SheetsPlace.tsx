/** Sheets: a draft of the item at hand, what has been issued, and verifying a sheet from its file. */
import { useCallback, useState } from "react";
import { EngagementForm } from "../appraise/EngagementForm.tsx";
import { goTo, useRoute } from "../frame/useRoute.ts";
import { Busy, ErrorNote, PaneLayout, SubPlaces } from "../parts/index.ts";
import { useRead } from "../workbench/useTask.ts";
import { useWorkbench, type Workbench } from "../workbench/workbench.ts";
import { DraftSheet } from "./DraftSheet.tsx";
import { IssuedSheet } from "./IssuedSheet.tsx";
import { SheetList } from "./SheetList.tsx";
import css from "./Sheets.module.css";
import { VerifySheet } from "./VerifySheet.tsx";

export function SheetsPlace() {
  const bench = useWorkbench();
  const { sub } = useRoute();
  const [stamp, setStamp] = useState(0);
  const { client, classId } = bench;
  // biome-ignore lint/correctness/useExhaustiveDependencies: `stamp` asks again after a sheet has changed
  const ask = useCallback(() => client.ask("listSheets", { classId: classId! }), [client, classId, stamp]);
  const { value: sheets, error } = useRead(classId === null ? null : ask);
  const changed = async () => {
    setStamp((now) => now + 1);
    await bench.reload();
  };
  const open = sub ?? (sheets === null || sheets.length === 0 ? "draft" : String(sheets[0]!.id));
  const view = (at: string, label: string) => ({ href: `#/sheets/${at}`, label, isCurrent: open === at });
  const left = (
    <>
      <SubPlaces label="Sheets" places={[view("draft", "Draft"), view("verify", "Verify a sheet")]} />
      {open === "draft" ? <Engagement bench={bench} /> : null}
      {error === null ? null : <ErrorNote error={error} />}
      {sheets === null ? <Busy words="Reading the sheets" /> : <SheetList sheets={sheets} open={open} />}
    </>
  );
  const shown = sheets?.find((sheet) => String(sheet.id) === open);
  const right =
    open === "verify" ? (
      <VerifySheet client={client} />
    ) : shown !== undefined ? (
      <IssuedSheet key={shown.id} client={client} sheet={shown} onChanged={changed} />
    ) : (
      <DraftSheet
        bench={bench}
        onIssued={async (id) => {
          await changed();
          goTo("sheets", String(id));
        }}
      />
    );
  return <PaneLayout name="sheets" leftWidth={400} leftLabel="Sheets" rightLabel="Sheet" left={left} right={right} />;
}

/** What the draft states about the assignment: the same words as under Appraise, changed here or there. */
function Engagement({ bench }: { bench: Workbench }) {
  const { engagement, subject, changeEngagement, changeSubject } = bench;
  if (engagement === null || subject === null) return null;
  return (
    <div className={css.engagement}>
      <EngagementForm
        engagement={engagement}
        subject={subject}
        onEngagement={(change) => changeEngagement((now) => ({ ...now, ...change }))}
        onSubject={(change) => changeSubject((now) => ({ ...now, ...change }), Object.keys(change).join())}
      />
    </div>
  );
}
