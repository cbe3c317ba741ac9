/** Verifying a sheet from its file alone: drop it or pick it, and every figure is worked out again. */
import { useState } from "react";
import type { Client } from "../../contract/client.ts";
import { Sentence } from "../parts/index.ts";
import { FileDoor } from "../sales/bringIn/FileDoor.tsx";
import { base64Of } from "./pdfFiles.ts";
import { VerificationView } from "./VerificationView.tsx";

export function VerifySheet({ client }: { readonly client: Client }) {
  const [file, setFile] = useState<{ name: string; bytesBase64: string } | null>(null);
  const take = async (picked: File) => {
    setFile({ name: picked.name, bytesBase64: await base64Of(picked) });
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
      {file === null ? null : (
        <>
          <p className="soft">{file.name}</p>
          <VerificationView client={client} bytesBase64={file.bytesBase64} />
        </>
      )}
    </>
  );
}
