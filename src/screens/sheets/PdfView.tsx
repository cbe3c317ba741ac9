/** A PDF shown in the page, with words in its place where the browser shows none. */
import { useEffect, useState } from "react";
import { blobOf } from "./pdfFiles.ts";
import css from "./Sheets.module.css";

export function PdfView({ bytesBase64, title }: { readonly bytesBase64: string; readonly title: string }) {
  const [url, setUrl] = useState<string | null>(null);
  useEffect(() => {
    const made = URL.createObjectURL(blobOf(bytesBase64));
    setUrl(made);
    return () => URL.revokeObjectURL(made);
  }, [bytesBase64]);
  if (url === null) return null;
  return (
    <div className={css.paper}>
      <iframe src={`${url}#navpanes=0&view=FitH`} title={title} />
      <p className="fine soft">
        Nothing to see above? This browser shows no PDFs inside a page:{" "}
        <a className={css.link} href={url} target="_blank" rel="noreferrer">
          open it by itself
        </a>
        .
      </p>
    </div>
  );
}
