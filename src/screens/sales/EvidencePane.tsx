/** Beside the register: what it comes to, what is being asked, and the rows that are held back. */
import { useCallback, useEffect, useRef, useState } from "react";
import type { AssetClass } from "../../domain/assetClass.ts";
import { formatNumber } from "../../domain/format.ts";
import type { Sale } from "../../domain/sale.ts";
import { Busy, ErrorNote, TextLink } from "../parts/index.ts";
import { useRead, useTask } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import { forgetOutcome, readOutcome } from "./bringIn/outcome.ts";
import { EvidenceCounts } from "./EvidenceCounts.tsx";
import css from "./EvidencePane.module.css";
import type { SaleState } from "./evidenceState.ts";
import { HeldBackRows } from "./HeldBackRows.tsx";
import { SaleDetail } from "./SaleDetail.tsx";
import { SetAsideAsk, saleName } from "./SetAsideAsk.tsx";
import type { Register } from "./useRegister.ts";
import { VerifyAsk } from "./VerifyAsk.tsx";

export interface EvidencePaneProps {
  readonly assetClass: AssetClass;
  readonly register: Register;
  readonly stateOf: (sale: Sale) => SaleState;
  /** Gives the keyboard back to the register. */
  readonly onAnswered: () => void;
}

interface Done {
  readonly words: string;
  readonly undo: (() => Promise<unknown>) | null;
}

export function EvidencePane({ assetClass, register, stateOf, onAnswered }: EvidencePaneProps) {
  const { client, appraisal, model, edition, status, error, reload } = useWorkbench();
  const classId = assetClass.id;
  const task = useTask();
  const [done, setDone] = useState<Done | null>(() => {
    const words = readOutcome();
    return words === null ? null : { words, undo: null };
  });
  useEffect(forgetOutcome, []);
  // The row that had the keyboard is gone: what was said of it takes it, and Tab goes on to the next row.
  const said = useRef<HTMLParagraphElement>(null);
  useEffect(() => {
    if (done !== null && document.activeElement === document.body) said.current?.focus({ preventScroll: true });
  }, [done]);
  const held = useHeldBack(classId, assetClass.dataVersion);
  const { meant, asking, ask, clearPicks } = register;
  const saleIds = meant.map(({ id }) => id);

  const act = async (words: string, work: () => Promise<unknown>, undo: Done["undo"]): Promise<void> => {
    const isDone = await task.run(async () => {
      await work();
      await reload();
      return true;
    });
    if (isDone === null) return;
    setDone({ words, undo });
    ask(null);
    clearPicks();
    onAnswered();
  };
  const setAside = (reason: string): void => {
    const ids = meant.filter(({ setAside }) => setAside === null).map(({ id }) => id);
    const words = `${capital(saleName(meant))} set aside: ${reason}.`;
    const undo = () => client.ask("putBackSales", { classId, saleIds: ids });
    void act(words, () => client.ask("setAsideSales", { classId, saleIds: ids, reason }), undo);
  };
  const cancel = (): void => {
    ask(null);
    onAnswered();
  };
  const heldDone = useCallback(
    (words: string) => {
      setDone({ words, undo: null });
      void reload().then(held.again);
    },
    [reload, held.again],
  );

  return (
    <>
      {appraisal !== null && model !== null ? (
        <EvidenceCounts
          account={appraisal.evidence}
          model={model}
          whose={status === "saved" && edition !== null ? `for edition ${edition.number}` : "now"}
          onList={register.setFilter}
        />
      ) : error !== null ? (
        <ErrorNote error={error} />
      ) : (
        <Busy words="Judging which sales are evidence …" />
      )}
      {done === null ? null : (
        <p ref={said} className={css.done} role="status" tabIndex={-1}>
          {done.words}{" "}
          {done.undo === null ? null : (
            <TextLink
              onPress={() => {
                const { undo } = done;
                setDone(null);
                void task.run(() => undo!().then(reload)).then(onAnswered);
              }}
            >
              Undo
            </TextLink>
          )}
        </p>
      )}
      {task.error === null ? null : <ErrorNote error={task.error} />}
      {asking === "setAside" && meant.length > 0 ? (
        <SetAsideAsk
          key={saleIds.join()}
          sales={meant}
          stateOf={stateOf}
          priced={appraisal?.priced ?? null}
          currencyCode={assetClass.currencyCode}
          isBusy={task.isRunning}
          onSetAside={setAside}
          onPutBack={() =>
            void act(
              `${capital(saleName(meant))} put back.`,
              () => client.ask("putBackSales", { classId, saleIds }),
              null,
            )
          }
          onCancel={cancel}
        />
      ) : null}
      {asking === "verify" && meant.length > 0 ? (
        <VerifyAsk
          key={saleIds.join()}
          sales={meant}
          isBusy={task.isRunning}
          onVerify={(how) =>
            void act(
              `${capital(saleName(meant))} verified: ${how}.`,
              () => client.ask("verifySales", { classId, saleIds, how }),
              null,
            )
          }
          onCancel={cancel}
        />
      ) : null}
      <Held held={held} onDone={heldDone} />
      {asking === null && meant.length === 1 ? <SaleDetail sale={meant[0]!} assetClass={assetClass} /> : null}
      {meant.length > 1 && asking === null ? (
        <p className="soft small">{formatNumber(meant.length)} sales picked: V verifies them, X sets them aside.</p>
      ) : null}
    </>
  );
}

function capital(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}

function useHeldBack(classId: number, stamp: number) {
  const { client } = useWorkbench();
  const [turn, setTurn] = useState(0);
  // biome-ignore lint/correctness/useExhaustiveDependencies: stamp and turn say that the rows changed
  const read = useCallback(
    () => Promise.all([client.ask("listHeldBack", { classId }), client.ask("listBatches", { classId })]),
    [client, classId, stamp, turn],
  );
  const again = useCallback(() => setTurn((now) => now + 1), []);
  return { ...useRead(read), again };
}

function Held({ held, onDone }: { held: ReturnType<typeof useHeldBack>; onDone: (words: string) => void }) {
  if (held.error !== null) return <ErrorNote error={held.error} />;
  if (held.value === null) return <Busy words="Reading the rows that are held back …" />;
  const [rows, batches] = held.value;
  if (rows.length === 0) return null;
  return <HeldBackRows rows={rows} batches={batches} onDone={onDone} />;
}
