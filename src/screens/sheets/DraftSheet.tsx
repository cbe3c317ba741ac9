/** The draft of the item at hand: what is still missing, the valuer's own adjustments, the pages as they would print, and issuing. */
import { useCallback, useEffect, useMemo, useState } from "react";
import type { RequestInput } from "../../contract/requests.ts";
import { listWords } from "../../domain/format.ts";
import type { SheetRequest } from "../../domain/sheetRecord.ts";
import type { Engagement } from "../../domain/subject.ts";
import { Busy, Button, EmptyState, ErrorNote, Field, Notice, SectionHeading, Sentence } from "../parts/index.ts";
import { useRead, useTask } from "../workbench/useTask.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { type Adjustment, Adjustments } from "./Adjustments.tsx";
import { PdfView } from "./PdfView.tsx";
import css from "./Sheets.module.css";

export interface DraftSheetProps {
  readonly bench: Workbench;
  readonly onIssued: (sheetId: number) => Promise<void>;
}

const NEEDED: readonly (readonly [keyof Engagement, string])[] = [
  ["basisOfValue", "basis of value"],
  ["premise", "premise of value"],
  ["marketLevel", "market level"],
  ["priceBasisWords", "price basis"],
];

/** What a price may not stand on a sheet without, by the names a valuer knows. */
export function missingFrom(engagement: Engagement): string[] {
  return NEEDED.filter(([key]) => String(engagement[key]).trim() === "").map(([, words]) => words);
}

/** The pages are set once typing rests. */
const REST_MS = 500;

function useRested<Value>(value: Value | null): Value | null {
  const [rested, setRested] = useState(value);
  useEffect(() => {
    const rest = setTimeout(() => setRested(value), REST_MS);
    return () => clearTimeout(rest);
  }, [value]);
  return rested ?? value;
}

export function DraftSheet({ bench, onIssued }: DraftSheetProps) {
  const { client, classId, model, subject, engagement, levels, appraisal } = bench;
  const [adjustments, setAdjustments] = useState<readonly Adjustment[]>([]);
  const [reason, setReason] = useState("");
  const issuing = useTask();
  const isPriced = appraisal?.priced !== null && appraisal !== null && bench.status !== "notPriced";
  const input = useMemo(() => {
    if (classId === null || model === null || subject === null || engagement === null || !isPriced) return null;
    const overrideReason = reason.trim() === "" ? null : reason.trim();
    const request: SheetRequest = { model, subject, engagement, levels, overrideReason, adjustments };
    return { classId, request } as RequestInput<"previewSheet">;
  }, [classId, model, subject, engagement, levels, reason, adjustments, isPriced]);
  const rested = useRested(input);
  const ask = useCallback(() => client.ask("previewSheet", rested!), [client, rested]);
  const preview = useRead(rested === null ? null : ask);
  if (engagement === null || subject === null) return <Busy words="Opening the draft" />;
  if (!isPriced) {
    return (
      <EmptyState sentence="There is no price to put on a sheet yet.">
        {bench.error === null ? null : <ErrorNote error={bench.error} />}
        <a className={css.link} href="#/appraise">
          Describe the item under Appraise
        </a>
      </EmptyState>
    );
  }
  const missing = missingFrom(engagement);
  const reach = appraisal!.priced!.reach;
  const isBeyond = reach.verdict === "beyond";
  const unreasoned = adjustments.some((one) => one.reason.trim() === "" || one.label.trim() === "");
  // What is issued is what is shown: not while the pages still speak of an earlier draft.
  const isShown = rested === input && preview.value !== null && !preview.isAwaited;
  const isReady = isShown && missing.length === 0 && !unreasoned && (!isBeyond || reason.trim() !== "");
  const issue = async () => {
    const issued = await issuing.run(() => client.ask("issueSheet", input as RequestInput<"issueSheet">));
    if (issued !== null) await onIssued(issued.sheet.id);
  };
  return (
    <>
      <div className={css.top}>
        <Sentence>
          Draft for <strong>{subject.title === "" ? "the item" : subject.title}</strong>
          {missing.length === 0 ? ": everything a headline price needs is stated." : "."}
        </Sentence>
        <Button primary disabled={!isReady || issuing.isRunning} onClick={() => void issue()}>
          Issue sheet
        </Button>
      </div>
      {missing.length === 0 ? null : (
        <Notice kind="refusal">
          A price may not stand on a sheet without its {listWords(missing)}. Fill these in under Engagement, on the
          left.
        </Notice>
      )}
      {isBeyond ? (
        <Notice kind="refusal" title={reach.sentence}>
          <Field label="Why it is priced all the same; this prints on the sheet">
            {(wiring) => <input {...wiring} value={reason} onChange={(event) => setReason(event.target.value)} />}
          </Field>
        </Notice>
      ) : null}
      {issuing.error === null ? null : <ErrorNote error={issuing.error} />}
      <Adjustments
        adjustments={adjustments}
        currencyCode={appraisal!.assetClass.currencyCode}
        onChange={setAdjustments}
      />
      <SectionHeading
        aside={
          preview.value === null
            ? undefined
            : `${preview.value.pageCount} pages, A4; once issued, a sheet is never altered`
        }
      >
        As it would print
      </SectionHeading>
      {preview.error === null ? null : <ErrorNote error={preview.error} />}
      {preview.value === null ? (
        preview.error === null ? (
          <Busy words="Setting the pages" />
        ) : null
      ) : (
        <PdfView bytesBase64={preview.value.bytesBase64} title={`Draft sheet for ${subject.title}`} />
      )}
    </>
  );
}
