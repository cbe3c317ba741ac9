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

/** Rows by the file they come from, the file brought in last first. */
export function byFile(rows: readonly StoredHeldBackRow[]): readonly (readonly StoredHeldBackRow[])[] {
  const files = new Map<number, StoredHeldBackRow[]>();
  for (const row of rows) files.set(row.batchId, [...(files.get(row.batchId) ?? []), row]);
  return [...files].sort(([a], [b]) => b - a).map(([, own]) => own.sort((a, b) => a.row - b.row));
}

/** "marrowby-week-18.csv: 46 rows, 37 taken in" */
export function fileWords(row: StoredHeldBackRow, batches: readonly ImportBatch[]): string {
  const batch = batches.find(({ id }) => id === row.batchId);
  if (batch === undefined) return row.fileName;
  return `${batch.fileName}: ${formatNumber(batch.read)} rows, ${formatNumber(batch.accepted)} taken in`;
}

export interface HeldBackRowsProps {
  readonly rows: readonly StoredHeldBackRow[];
  readonly batches: readonly ImportBatch[];
  readonly onDone: (words: string) => void;
}

export function HeldBackRows({ rows, batches, onDone }: HeldBackRowsProps) {
  return byFile(rows).map((own) => (
    <section key={own[0]!.batchId} className={css.section} aria-labelledby={`held-back-${own[0]!.batchId}`}>
      <SectionHeading id={`held-back-${own[0]!.batchId}`} aside={fileWords(own[0]!, batches)}>
        {formatNumber(own.length)} {own.length === 1 ? "row" : "rows"} held back
      </SectionHeading>
      <ul className={css.held}>
        {own.map((row) => (
          <HeldBackItem key={row.id} row={row} onDone={onDone} />
        ))}
      </ul>
    </section>
  ));
}

type ItemProps = { row: StoredHeldBackRow; onDone: (words: string) => void };

function HeldBackItem({ row, onDone }: ItemProps) {
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
