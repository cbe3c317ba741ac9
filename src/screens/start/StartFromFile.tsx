/** The second door: a class made from its first file of sales; both are made, or neither. */
import { useEffect, useRef, useState } from "react";
import type { RequestInput } from "../../contract/requests.ts";
import { formatNumber, listWords } from "../../domain/format.ts";
import { goTo } from "../frame/useRoute.ts";
import { Button, ErrorNote, Field, PaneLayout, SectionHeading, TextLink } from "../parts/index.ts";
import bringIn from "../sales/bringIn/BringIn.module.css";
import { FilePanel } from "../sales/bringIn/FilePanel.tsx";
import { leaveOutcome } from "../sales/bringIn/outcome.ts";
import { PreviewPane } from "../sales/bringIn/PreviewPane.tsx";
import type { PickedFile } from "../sales/bringIn/readFile.ts";
import { missingTargets } from "../sales/bringIn/targets.ts";
import { type Import, useImport } from "../sales/bringIn/useImport.ts";
import { useTask } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import css from "./StartPlace.module.css";

/** "auction-results_2026.csv" → "Auction results 2026" */
export function nameOfFile(fileName: string): string {
  const words = fileName
    .replace(/\.[a-z0-9]{1,5}$/i, "")
    .replace(/[-_\s]+/g, " ")
    .trim();
  return words.charAt(0).toUpperCase() + words.slice(1, 80);
}

export function StartFromFile({ file, onBack }: { file: PickedFile; onBack: () => void }) {
  const incoming = useImport(null);
  const { pick } = incoming;
  const isGiven = useRef(false);
  useEffect(() => {
    isGiven.current = true;
    pick(file);
  }, [file, pick]);
  useEffect(() => {
    if (isGiven.current && incoming.file === null && incoming.preview !== null) onBack();
  }, [incoming.file, incoming.preview, onBack]);
  return (
    <PaneLayout
      name="bring-in"
      rightWidth={520}
      leftLabel="The file"
      rightLabel="What would come of it"
      left={
        <>
          <div className={bringIn.title}>
            <h1>Start a class from a file</h1>
            <TextLink onPress={onBack}>Back to the doors</TextLink>
          </div>
          <FilePanel incoming={incoming} attributes={[]} />
        </>
      }
      right={<Begin incoming={incoming} fileName={file.fileName} />}
    />
  );
}

function Begin({ incoming, fileName }: { incoming: Import; fileName: string }) {
  const { client, openClass } = useWorkbench();
  const [name, setName] = useState(() => nameOfFile(fileName));
  const [itemWord, setItemWord] = useState("item");
  const task = useTask();
  const { file, options, match, preview, isAwaited } = incoming;
  const missing = match === null ? [] : missingTargets(match);
  const accepted = preview?.accepted ?? 0;
  const isReady = name.trim() !== "" && itemWord.trim() !== "" && accepted > 0 && !isAwaited;
  const start = (): void => {
    void task.run(async () => {
      const input = { name, itemWord, fileName, bytesBase64: file!.bytesBase64, options, match };
      const { classId, sentence } = await client.ask("startClassFromFile", input as RequestInput<"startClassFromFile">);
      leaveOutcome(`${fileName}: ${sentence}`);
      await openClass(classId);
      goTo("sales");
    });
  };
  return (
    <>
      <section aria-labelledby="the-class" className={css.theClass}>
        <SectionHeading id="the-class">The class</SectionHeading>
        <div className={css.names}>
          <Field label="Name of the class">
            {(wiring) => (
              <input {...wiring} value={name} maxLength={80} onChange={(event) => setName(event.target.value)} />
            )}
          </Field>
          <Field label="What one of them is called">
            {(wiring) => (
              <input
                {...wiring}
                value={itemWord}
                maxLength={40}
                placeholder="machine, boat, house"
                onChange={(event) => setItemWord(event.target.value)}
              />
            )}
          </Field>
        </div>
      </section>
      {preview === null ? null : <PreviewPane preview={preview} />}
      <div className={bringIn.take}>
        {missing.length === 0 ? null : (
          <p className="brick">Say which column holds the {listWords(missing)}: no sale can be read without.</p>
        )}
        {task.error === null ? null : <ErrorNote error={task.error} />}
        <div className={bringIn.acts}>
          <Button primary onClick={start} disabled={!isReady || task.isRunning}>
            Start with {formatNumber(accepted)} {accepted === 1 ? "sale" : "sales"}
          </Button>
        </div>
      </div>
    </>
  );
}
