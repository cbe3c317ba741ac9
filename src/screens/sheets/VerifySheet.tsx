/** Verifying a sheet from its file alone: drop it or pick it, and every figure is worked out again. */
import { type DragEvent, useState } from "react";
import type { Client } from "../../contract/client.ts";
import { Sentence } from "../parts/index.ts";
import { base64Of } from "./pdfFiles.ts";
import css from "./Sheets.module.css";
import { VerificationView } from "./VerificationView.tsx";

export function VerifySheet({ client }: { readonly client: Client }) {
  const [file, setFile] = useState<{ name: string; bytesBase64: string } | null>(null);
  const take = async (picked: File | undefined) => {
    if (picked !== undefined) setFile({ name: picked.name, bytesBase64: await base64Of(picked) });
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    void take(event.dataTransfer.files[0]);
  };
  return (
    <>
      <Sentence>
        A sheet is verified from its file alone: the evidence in it is fitted again, and every figure compared.
      </Sentence>
      {/* biome-ignore lint/a11y/noStaticElementInteractions: dropping is a second way to the labelled file field inside */}
      <div className={css.drop} onDragOver={(event) => event.preventDefault()} onDrop={drop}>
        <label>
          Sheet to verify (PDF)
          <input type="file" accept="application/pdf,.pdf" onChange={(event) => void take(event.target.files?.[0])} />
        </label>
        <span className="soft">or drop it here</span>
      </div>
      {file === null ? null : (
        <>
          <p className="soft">{file.name}</p>
          <VerificationView client={client} bytesBase64={file.bytesBase64} />
        </>
      )}
    </>
  );
}
