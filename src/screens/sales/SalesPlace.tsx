/** The register of sales with what it comes to; or, at "sales/bring-in", the way in for a file. */
import { useCallback, useMemo, useRef, useState } from "react";
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import type { AssetClass } from "../../domain/assetClass.ts";
import { formatNumber } from "../../domain/format.ts";
import { priceBasisWords, type Sale } from "../../domain/sale.ts";
import { goTo, useRoute } from "../frame/useRoute.ts";
import { Busy, Button, EmptyState, ErrorNote, KeyCap, PaneLayout, TextLink } from "../parts/index.ts";
import { useActs } from "../workbench/acts.ts";
import { useTask } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import { BringIn } from "./bringIn/BringIn.tsx";
import { EvidencePane } from "./EvidencePane.tsx";
import { stateOfSales } from "./evidenceState.ts";
import { NO_FILTER } from "./filters.ts";
import { ColumnChoice, type ColumnChoiceProps, RegisterBar } from "./RegisterBar.tsx";
import { RegisterTable } from "./RegisterTable.tsx";
import css from "./SalesPlace.module.css";
import { type Register, useRegister } from "./useRegister.ts";

const RIGHT = 432;
const NO_EVIDENCE: readonly AttributeEvidence[] = [];
/** More than this is not picked with one tick. */
const MOST_PICKED = 10_000;
const BLOCK = 500;

export function SalesPlace() {
  const { assetClass, error } = useWorkbench();
  const { sub } = useRoute();
  if (assetClass === null) return error === null ? <Busy words="Opening the class …" /> : <ErrorNote error={error} />;
  if (sub === "bring-in") return <BringIn assetClass={assetClass} />;
  return <Worktable assetClass={assetClass} />;
}

/** Attributes that are not to stand in the register; remembered for the class. */
function useHidden(classId: number) {
  const name = `lotwright.columns.${classId}`;
  const [hidden, setHidden] = useState<ReadonlySet<string>>(
    () => new Set((localStorage.getItem(name) ?? "").split(",").filter((key) => key !== "")),
  );
  const hide = useCallback(
    (next: ReadonlySet<string>) => {
      localStorage.setItem(name, [...next].join(","));
      setHidden(next);
    },
    [name],
  );
  return { hidden, hide };
}

function Worktable({ assetClass }: { assetClass: AssetClass }) {
  const { appraisal } = useWorkbench();
  const register = useRegister(assetClass.id);
  const left = useRef<HTMLDivElement>(null);
  const focusGrid = useCallback(() => left.current?.querySelector("table")?.focus({ preventScroll: true }), []);
  const account = appraisal?.evidence ?? null;
  const stateOf = useMemo(() => stateOfSales(account, assetClass.attributes), [account, assetClass.attributes]);
  const evidence = appraisal?.report.attributeEvidence ?? NO_EVIDENCE;
  useRegisterActs(register);
  return (
    <PaneLayout
      name="sales"
      rightWidth={RIGHT}
      leftLabel="Sales register"
      rightLabel="What it comes to"
      left={
        <div ref={left} className={css.left}>
          <RegisterWhole assetClass={assetClass} register={register} evidence={evidence} stateOf={stateOf} />
        </div>
      }
      right={<EvidencePane assetClass={assetClass} register={register} stateOf={stateOf} onAnswered={focusGrid} />}
    />
  );
}

function useRegisterActs({ ask, setFilter, clearPicks }: Register): void {
  useActs(
    useMemo(
      () => [
        { label: "Bring in sales", run: () => goTo("sales", "bring-in") },
        { label: "Verify the picked sales", keys: "V", run: () => ask("verify") },
        { label: "Set the picked sales aside", keys: "X", run: () => ask("setAside") },
        { label: "Show all sales", run: () => setFilter(NO_FILTER) },
        { label: "Clear what is picked", run: clearPicks },
      ],
      [ask, setFilter, clearPicks],
    ),
  );
}

interface WholeProps {
  readonly assetClass: AssetClass;
  readonly register: Register;
  readonly evidence: readonly AttributeEvidence[];
  readonly stateOf: ReturnType<typeof stateOfSales>;
}

function RegisterWhole({ assetClass, register, evidence, stateOf }: WholeProps) {
  const { summary } = useWorkbench();
  const { hidden, hide } = useHidden(assetClass.id);
  const picking = usePickAll(register);
  const saleCount = summary?.saleCount ?? 0;
  const { book } = register;
  return (
    <>
      <RegisterBar assetClass={assetClass} register={register} evidence={evidence} saleCount={saleCount} />
      {book.error === null ? null : <ErrorNote error={book.error} />}
      {picking.error === null ? null : <ErrorNote error={picking.error} />}
      {book.total === null ? (
        <div className={css.rest}>{book.error === null ? <Busy words="Reading the register …" /> : null}</div>
      ) : saleCount === 0 && book.total === 0 ? (
        <EmptyState sentence="No sales yet. Bring in a file of sales: an auction’s result list, or a spreadsheet saved as CSV.">
          <Button primary onClick={() => goTo("sales", "bring-in")}>
            Bring in sales
          </Button>
        </EmptyState>
      ) : book.total === 0 ? (
        <EmptyState sentence="No sale fits these filters.">
          <TextLink onPress={() => register.setFilter(NO_FILTER)}>Show all {formatNumber(saleCount)}</TextLink>
        </EmptyState>
      ) : (
        <RegisterTable
          assetClass={assetClass}
          register={register}
          evidence={evidence}
          stateOf={stateOf}
          hidden={hidden}
          onPickAll={picking.pickAll}
        />
      )}
      <Foot assetClass={assetClass} register={register} hidden={hidden} onHide={hide} />
    </>
  );
}

function Foot({ assetClass, register, hidden, onHide }: ColumnChoiceProps & { register: Register }) {
  const { total } = register.book;
  return (
    <div className={css.foot}>
      <span>
        {total === null
          ? ""
          : `row ${formatNumber(Math.min(total, register.cursor.row + 1))} of ${formatNumber(total)}`}
      </span>
      <span>
        <KeyCap>↑</KeyCap> <KeyCap>↓</KeyCap> move
      </span>
      <span>
        <KeyCap>Space</KeyCap> pick
      </span>
      <span>
        <KeyCap>V</KeyCap> verify
      </span>
      <span>
        <KeyCap>X</KeyCap> set aside
      </span>
      <span>
        rail: <i className={css.railSetAside} /> set aside <i className={css.railMissing} /> value missing
      </span>
      <ColumnChoice assetClass={assetClass} hidden={hidden} onHide={onHide} />
      <span className={css.basis}>
        {assetClass.currencyCode}, {priceBasisWords(assetClass.priceBasis)}
      </span>
    </div>
  );
}

function usePickAll({ query, book, pick, clearPicks }: Register) {
  const { client } = useWorkbench();
  const task = useTask();
  const pickAll = (isPicked: boolean): void => {
    if (!isPicked) {
      clearPicks();
      return;
    }
    void task.run(async () => {
      const all: Sale[] = [];
      const most = Math.min(book.total ?? 0, MOST_PICKED);
      for (let offset = 0; offset < most; offset += BLOCK) {
        const { rows } = await client.ask("listSales", { ...query, offset, limit: BLOCK });
        all.push(...rows);
      }
      pick(all, true);
    });
  };
  return { pickAll, error: task.error };
}
