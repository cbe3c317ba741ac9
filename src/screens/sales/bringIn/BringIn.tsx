/** Brings a file of sales into the class: what would come of it stands beside, live, before anything is written. */
import type { RequestInput } from "../../../contract/requests.ts";
import type { AssetClass } from "../../../domain/assetClass.ts";
import { formatNumber, listWords } from "../../../domain/format.ts";
import { goTo, hrefOf } from "../../frame/useRoute.ts";
import { Button, ErrorNote, PaneLayout, Sentence, TextLink } from "../../parts/index.ts";
import { useTask } from "../../workbench/useTask.ts";
import { useWorkbench } from "../../workbench/workbench.ts";
import { Batches } from "./Batches.tsx";
import css from "./BringIn.module.css";
import { FilePanel } from "./FilePanel.tsx";
import { leaveOutcome } from "./outcome.ts";
import { PreviewPane } from "./PreviewPane.tsx";
import { missingTargets } from "./targets.ts";
import { useImport } from "./useImport.ts";

export function BringIn({ assetClass }: { assetClass: AssetClass }) {
  const incoming = useImport(assetClass.id);
  return (
    <PaneLayout
      name="bring-in"
      rightWidth={520}
      leftLabel="The file"
      rightLabel="What would come of it"
      left={
        <>
          <div className={css.title}>
            <h1>Bring in sales</h1>
            <TextLink href={hrefOf("sales")}>Back to the register</TextLink>
          </div>
          <FilePanel incoming={incoming} attributes={assetClass.attributes} />
        </>
      }
      right={
        incoming.preview === null || incoming.match === null ? (
          <Resting hasFile={incoming.file !== null} classId={assetClass.id} />
        ) : (
          <>
            <PreviewPane preview={incoming.preview} />
            <TakeIn incoming={incoming} classId={assetClass.id} />
          </>
        )
      }
    />
  );
}

function Resting({ hasFile, classId }: { hasFile: boolean; classId: number }) {
  return (
    <>
      {hasFile ? null : (
        <Sentence narrow>
          Every row of a file is accounted for: taken in, held back with its reason, or found to be a sale that is there
          already.
        </Sentence>
      )}
      <div className={css.batchList}>
        <Batches classId={classId} />
      </div>
    </>
  );
}

interface TakeInProps {
  readonly incoming: ReturnType<typeof useImport>;
  readonly classId: number;
}

function TakeIn({ incoming, classId }: TakeInProps) {
  const { client, reload } = useWorkbench();
  const task = useTask();
  const { file, options, match, preview, isAwaited, pick } = incoming;
  const missing = match === null ? [] : missingTargets(match);
  const accepted = preview?.accepted ?? 0;
  const heldBack = preview?.heldBack.length ?? 0;
  const take = (): void => {
    void task.run(async () => {
      const { fileName, bytesBase64 } = file!;
      const input = { classId, fileName, bytesBase64, options, match } as RequestInput<"importSales">;
      const { sentence } = await client.ask("importSales", input);
      leaveOutcome(`${fileName}: ${sentence}`);
      pick(null);
      await reload();
      goTo("sales");
    });
  };
  return (
    <div className={css.take}>
      {missing.length === 0 ? null : (
        <p className="brick">Say which column holds the {listWords(missing)}: no sale can be read without.</p>
      )}
      {task.error === null ? null : <ErrorNote error={task.error} />}
      <div className={css.acts}>
        <Button primary onClick={take} disabled={task.isRunning || isAwaited || accepted + heldBack === 0}>
          {accepted === 0
            ? "Keep the rows, held back"
            : `Take in ${formatNumber(accepted)} ${accepted === 1 ? "sale" : "sales"}`}
        </Button>
        <Button onClick={() => pick(null)} disabled={task.isRunning}>
          Not this file
        </Button>
        <span className="fine soft">can be undone whole</span>
      </div>
    </div>
  );
}
