/** Verifying a sheet from its file alone: drop it or pick it, and every figure is worked out again. */
import { useState } from "react";
import type { Client } from "../../contract/client.ts";
import { ErrorNote, Sentence } from "../parts/index.ts";
import { FileDoor } from "../sales/bringIn/FileDoor.tsx";
import { useTask } from "../workbench/useTask.ts";
import { base64Of } from "./pdfFiles.ts";
import { VerificationView } from "./VerificationView.tsx";

export function VerifySheet({ client }: { readonly client: Client }) {
  const [file, setFile] = useState<{ name: string; bytesBase64: string } | null>(null);
  const [picks, setPicks] = useState(0);
  const reading = useTask();
  const take = async (picked: File) => {
    setFile(null);
    const bytesBase64 = await reading.run(() => base64Of(picked));
    setPicks((now) => now + 1);
    setFile(bytesBase64 === null ? null : { name: picked.name, bytesBase64 });
  };
  return (
    <>
      <Sentence>
        A sheet is verified from its file alone: the evidence in it is fitted again, and every figure compared.
      </Sentence>
      <FileDoor
        words="Pick the PDF of a sheet, or drop it here"
        note="nothing is kept of it, and nothing leaves this machine"
        accept="application/pdf,.pdf"
        onFile={(picked) => void take(picked)}
      />
      {reading.error === null ? null : <ErrorNote error={reading.error} />}
      {file === null ? null : (
        <>
          <p className="soft">{file.name}</p>
          <VerificationView key={picks} client={client} bytesBase64={file.bytesBase64} />
        </>
      )}
    </>
  );
}
