/** One issued sheet: its pages, saving it, verifying it, and withdrawing it with a reason. */
import { useCallback, useState } from "react";
import type { Client } from "../../contract/client.ts";
import { formatDay, formatMoney } from "../../domain/format.ts";
import type { SheetRecord } from "../../domain/sheetRecord.ts";
import { Busy, Button, ErrorNote, InlineAsk, Notice, Sentence } from "../parts/index.ts";
import { useRead, useTask } from "../workbench/useTask.ts";
import { PdfView } from "./PdfView.tsx";
import { saveFile } from "./pdfFiles.ts";
import css from "./Sheets.module.css";
import { VerificationView } from "./VerificationView.tsx";

export interface IssuedSheetProps {
  readonly client: Client;
  readonly sheet: SheetRecord;
  readonly onChanged: () => Promise<void>;
}

export function IssuedSheet({ client, sheet, onChanged }: IssuedSheetProps) {
  const ask = useCallback(() => client.ask("readSheet", { sheetId: sheet.id }), [client, sheet.id]);
  const { value, error } = useRead(ask);
  const [isAsking, setIsAsking] = useState(false);
  const [isVerifying, setIsVerifying] = useState(false);
  const act = useTask();
  const withdraw = async (reason: string) => {
    const done = await act.run(() => client.ask("withdrawSheet", { sheetId: sheet.id, reason }));
    setIsAsking(false);
    if (done !== null) await onChanged();
  };
  if (error !== null) return <ErrorNote error={error} />;
  return (
    <>
      <div className={css.top}>
        <Sentence>
          Sheet <strong>{sheet.number}</strong>: {sheet.title} at{" "}
          <strong>{formatMoney(sheet.amount, sheet.currencyCode)}</strong>, issued{" "}
          {formatDay(sheet.issuedAtUtc.slice(0, 10))}
          {sheet.state === "issued" ? "." : ` and since ${sheet.state}.`}
        </Sentence>
        <div className={css.acts}>
          <Button
            primary
            disabled={value === null}
            onClick={() => void act.run(() => saveFile(`${sheet.number}.pdf`, value!.bytesBase64))}
          >
            Save PDF
          </Button>
          <Button disabled={value === null} onClick={() => setIsVerifying(true)}>
            Verify
          </Button>
          {sheet.state === "issued" ? <Button onClick={() => setIsAsking(true)}>Withdraw</Button> : null}
        </div>
      </div>
      {sheet.stateReason === null ? null : <Notice>{`${sheet.state}: ${sheet.stateReason}`}</Notice>}
      {isAsking ? (
        <InlineAsk
          question="Why is the sheet withdrawn? It stays in the list, marked so."
          verb="Withdraw"
          onAnswer={(reason) => void withdraw(reason)}
          onCancel={() => setIsAsking(false)}
        />
      ) : null}
      {act.error === null ? null : <ErrorNote error={act.error} />}
      {isVerifying && value !== null ? <VerificationView client={client} bytesBase64={value.bytesBase64} /> : null}
      {value === null ? (
        <Busy words="Reading the sheet" />
      ) : (
        <PdfView bytesBase64={value.bytesBase64} title={`Sheet ${sheet.number}`} />
      )}
    </>
  );
}
