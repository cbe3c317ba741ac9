/** The left side of bringing in: the file, how it is read, what its columns are, and what it does not say. */
import type { Attribute } from "../../../domain/attribute.ts";
import { formatNumber } from "../../../domain/format.ts";
import { Busy, Button, ErrorNote } from "../../parts/index.ts";
import { useTask } from "../../workbench/useTask.ts";
import css from "./BringIn.module.css";
import { ColumnTable } from "./ColumnTable.tsx";
import { FileDoor } from "./FileDoor.tsx";
import { FixedValues } from "./FixedValues.tsx";
import { ReadingOptionsForm } from "./ReadingOptionsForm.tsx";
import { readFile, sizeWords } from "./readFile.ts";
import type { Import } from "./useImport.ts";

export interface FilePanelProps {
  readonly incoming: Import;
  readonly attributes: readonly Attribute[];
}

export function FilePanel({ incoming, attributes }: FilePanelProps) {
  const { file, options, match, preview, error, isAwaited, pick, changeOptions, changeMatch } = incoming;
  const task = useTask();
  const take = (picked: File): void => {
    void task.run(async () => pick(await readFile(picked)));
  };
  if (file === null) {
    return (
      <>
        <FileDoor
          words="Pick a file of sales, or drop it here"
          note="CSV or another list as text, with one sale a row. A workbook has to be saved as CSV first."
          accept=".csv,.tsv,.txt,text/csv,text/plain"
          onFile={take}
        />
        {task.isRunning ? <Busy words="Reading the file …" /> : null}
        {task.error === null ? null : <ErrorNote error={task.error} />}
      </>
    );
  }
  return (
    <div className={css.stack}>
      <div className={css.file}>
        <b>{file.fileName}</b>
        <span className="soft small">
          {sizeWords(file.size)}
          {preview === null ? "" : `, ${formatNumber(preview.read)} rows`}
        </span>
        <Button onClick={() => pick(null)}>Another file</Button>
        {isAwaited && preview !== null ? <Busy words="Reading again …" /> : null}
      </div>
      {error === null ? null : <ErrorNote error={error} />}
      {preview === null && error === null ? <Busy words={`Reading ${file.fileName} …`} /> : null}
      {options !== null && preview !== null ? (
        <ReadingOptionsForm options={options} detected={preview.detected} onChange={changeOptions} />
      ) : null}
      {match !== null && preview !== null ? (
        <>
          <ColumnTable match={match} preview={preview} attributes={attributes} onChange={changeMatch} />
          <FixedValues match={match} onChange={changeMatch} />
        </>
      ) : null}
    </div>
  );
}
