/** Files that were brought in, newest first; each can be taken out again whole. */
import { useCallback, useState } from "react";
import { formatDay, formatNumber } from "../../../domain/format.ts";
import type { ImportBatch } from "../../../domain/importRecord.ts";
import { Busy, Button, ErrorNote, Notice, SectionHeading, TextLink } from "../../parts/index.ts";
import { useRead, useTask } from "../../workbench/useTask.ts";
import { useWorkbench } from "../../workbench/workbench.ts";
import css from "./BringIn.module.css";

export function Batches({ classId }: { classId: number }) {
  const { client, assetClass } = useWorkbench();
  const stamp = assetClass?.dataVersion ?? 0;
  // biome-ignore lint/correctness/useExhaustiveDependencies: the stamp says that the class's data changed
  const ask = useCallback(() => client.ask("listBatches", { classId }), [client, classId, stamp]);
  const { value, error } = useRead(ask);
  if (error !== null) return <ErrorNote error={error} />;
  if (value === null) return <Busy words="Reading what was brought in …" />;
  if (value.length === 0) return <p className="soft">Nothing was brought into this class from a file yet.</p>;
  return (
    <section aria-labelledby="batches">
      <SectionHeading id="batches">Brought in before</SectionHeading>
      <ul className={css.batches}>
        {value.map((batch) => (
          <Batch key={batch.id} batch={batch} />
        ))}
      </ul>
    </section>
  );
}

function Batch({ batch }: { batch: ImportBatch }) {
  const { client, reload } = useWorkbench();
  const [isAsking, setAsking] = useState(false);
  const task = useTask();
  const { assetClassId: classId, id: batchId } = batch;
  const undo = (): void => {
    void task.run(async () => {
      await client.ask("undoBatch", { classId, batchId });
      setAsking(false);
      await reload();
    });
  };
  return (
    <li className={batch.undone ? css.undone : undefined}>
      <div>
        <b>{batch.fileName}</b>{" "}
        <span className="soft small">
          {formatDay(batch.importedAtUtc.slice(0, 10))}, {batch.importedBy}
        </span>
        <div className="small">
          {formatNumber(batch.read)} rows read = {formatNumber(batch.accepted)} taken in +{" "}
          {formatNumber(batch.heldBack)} held back + {formatNumber(batch.duplicates)}{" "}
          {batch.duplicates === 1 ? "duplicate" : "duplicates"}
        </div>
      </div>
      {batch.undone ? (
        <span className="soft small">undone</span>
      ) : (
        <TextLink onPress={() => setAsking(true)} title={`Undo the import of ${batch.fileName}`}>
          Undo whole
        </TextLink>
      )}
      {isAsking ? (
        <div className={css.wide}>
          <Notice title={`Take all of ${batch.fileName} out again?`}>
            <p>
              Its {formatNumber(batch.accepted)} sales leave the register, and its held-back rows with them. Editions
              and sheets that rest on them stay as they are.
            </p>
            <div className={css.acts}>
              <Button primary onClick={undo} disabled={task.isRunning}>
                Undo whole
              </Button>
              <Button onClick={() => setAsking(false)}>Keep them</Button>
            </div>
          </Notice>
        </div>
      ) : null}
      {task.error === null ? null : (
        <div className={css.wide}>
          <ErrorNote error={task.error} />
        </div>
      )}
    </li>
  );
}
