/** Rows that could not be read: the value as it stands in the file first, then why, then what can be done about it. */
import { useCallback, useState } from "react";
import { formatNumber } from "../../domain/format.ts";
import type { HeldBackReason, ImportBatch, StoredHeldBackRow } from "../../domain/importRecord.ts";
import { ErrorNote, InlineAsk, SectionHeading, TextLink } from "../parts/index.ts";
import { useTask } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import css from "./EvidencePane.module.css";
import { MendRow } from "./MendRow.tsx";

/** The reason that a row is shown by: the first that the program has a reading for, else the first. */
export function mainReason(reasons: readonly HeldBackReason[]): HeldBackReason | null {
  return reasons.find(({ suggestion }) => suggestion !== null) ?? reasons[0] ?? null;
}

/** "marrowby-week-18.csv: 46 rows, 37 taken in", or how many files they come from. */
export function fileWords(rows: readonly StoredHeldBackRow[], batches: readonly ImportBatch[]): string {
  const ids = new Set(rows.map(({ batchId }) => batchId));
  const batch = batches.find(({ id }) => ids.has(id));
  if (ids.size > 1) return `from ${formatNumber(ids.size)} files`;
  if (batch === undefined) return "";
  return `${batch.fileName}: ${formatNumber(batch.read)} rows, ${formatNumber(batch.accepted)} taken in`;
}

export interface HeldBackRowsProps {
  readonly rows: readonly StoredHeldBackRow[];
  readonly batches: readonly ImportBatch[];
  readonly onDone: (words: string) => void;
}

export function HeldBackRows({ rows, batches, onDone }: HeldBackRowsProps) {
  const isManyFiles = new Set(rows.map(({ batchId }) => batchId)).size > 1;
  return (
    <section className={css.section} aria-labelledby="held-back">
      <SectionHeading id="held-back" aside={fileWords(rows, batches)}>
        {formatNumber(rows.length)} {rows.length === 1 ? "row" : "rows"} held back
      </SectionHeading>
      <ul className={css.held}>
        {rows.map((row) => (
          <HeldBackItem key={row.id} row={row} showsFile={isManyFiles} onDone={onDone} />
        ))}
      </ul>
    </section>
  );
}

type ItemProps = { row: StoredHeldBackRow; showsFile: boolean; onDone: (words: string) => void };

function HeldBackItem({ row, showsFile, onDone }: ItemProps) {
  const { client, classId } = useWorkbench();
  const [asking, setAsking] = useState<"mend" | "leaveOut" | null>(null);
  const task = useTask();
  const reason = mainReason(row.reasons);
  const others = row.reasons.length - 1;
  const mend = useCallback(
    async (cells: Record<string, string>) => {
      const answer = await task.run(() => client.ask("mendHeldBack", { classId: classId!, heldBackId: row.id, cells }));
      if (answer === null) return;
      if (answer.accepted) onDone(`Row ${row.row} is in the register now.`);
      else onDone(`Row ${row.row} is not ready yet: ${answer.row?.reasons[0]?.reason ?? ""}`);
    },
    [client, classId, row, task.run, onDone],
  );
  const leaveOut = async (why: string): Promise<void> => {
    const answer = await task.run(() =>
      client.ask("leaveOutHeldBack", { classId: classId!, heldBackId: row.id, reason: why }),
    );
    if (answer !== null) onDone(`Row ${row.row} is left out: ${why}`);
  };
  return (
    <li>
      <span className={css.number} title={row.fileName}>
        row {row.row}
      </span>
      <div>
        <b className={css.raw}>{rawOf(reason, row)}</b> <span className="soft">{reason?.column ?? ""}</span>
        <div>
          {reason?.reason}
          {others > 0 ? <span className="soft"> {formatNumber(others)} more in this row.</span> : null}
          {showsFile ? <span className="soft"> {row.fileName}</span> : null}
        </div>
      </div>
      <div className={css.heldActs}>
        <div>
          {reason?.suggestion === null || reason?.suggestion === undefined || reason.column === null ? (
            <TextLink onPress={() => setAsking("mend")}>Mend</TextLink>
          ) : (
            <TextLink onPress={() => void mend({ [reason.column!]: reason.suggestion! })}>
              Read as {reason.suggestion}
            </TextLink>
          )}
        </div>
        <div className="fine">
          {reason?.suggestion === null || reason?.suggestion === undefined ? null : (
            <>
              <TextLink onPress={() => setAsking("mend")}>Mend</TextLink> ·{" "}
            </>
          )}
          <TextLink onPress={() => setAsking("leaveOut")}>Leave out</TextLink>
        </div>
      </div>
      {asking === "mend" ? (
        <MendRow
          row={row}
          isBusy={task.isRunning}
          onMend={(cells) => void mend(cells)}
          onCancel={() => setAsking(null)}
        />
      ) : null}
      {asking === "leaveOut" ? (
        <div className={css.mend}>
          <InlineAsk
            question={`Why is row ${row.row} left out?`}
            verb="Leave out"
            preview="It stays counted with its file, with this reason."
            onAnswer={(why) => void leaveOut(why)}
            onCancel={() => setAsking(null)}
          />
        </div>
      ) : null}
      {task.error === null ? null : (
        <div className={css.mend}>
          <ErrorNote error={task.error} />
        </div>
      )}
    </li>
  );
}

function rawOf(reason: HeldBackReason | null, row: StoredHeldBackRow): string {
  if (reason?.value !== null && reason?.value !== undefined && reason.value !== "") return reason.value;
  if (reason?.column !== null && reason?.column !== undefined) return "empty";
  return Object.values(row.cells).find((cell) => cell !== "") ?? "the whole row";
}
