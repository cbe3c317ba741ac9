/** The register as a virtual grid: only the rows in sight are drawn, each says where it stands among all. */
import { useVirtualizer } from "@tanstack/react-virtual";
import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import type { AssetClass } from "../../domain/assetClass.ts";
import { formatNumber } from "../../domain/format.ts";
import type { Sale } from "../../domain/sale.ts";
import { columnsFor, widthOf } from "./columns.ts";
import type { SaleState } from "./evidenceState.ts";
import css from "./Register.module.css";
import { RegisterHead } from "./RegisterHead.tsx";
import { cellId, RegisterRow } from "./RegisterRow.tsx";
import { ScrollRail } from "./ScrollRail.tsx";
import type { Register } from "./useRegister.ts";
import { useRegisterKeys } from "./useRegisterKeys.ts";

export const ROW = 24;
const HEAD = 54;
const OVERSCAN = 8;
const NO_EVIDENCE: readonly AttributeEvidence[] = [];

export interface RegisterTableProps {
  readonly assetClass: AssetClass;
  readonly register: Register;
  readonly evidence: readonly AttributeEvidence[] | null;
  readonly stateOf: (sale: Sale) => SaleState;
  readonly hidden: ReadonlySet<string>;
  readonly onPickAll: (isPicked: boolean) => void;
}

export function RegisterTable(props: RegisterTableProps) {
  const { assetClass, register, evidence, stateOf, hidden, onPickAll } = props;
  const { book, version, cursor, picked, asking, pick, moveTo } = register;
  const scroller = useRef<HTMLDivElement>(null);
  const size = useSize(scroller);
  const total = book.total ?? 0;
  const virtual = useVirtualizer({
    count: total,
    getScrollElement: () => scroller.current,
    estimateSize: () => ROW,
    overscan: OVERSCAN,
    scrollPaddingStart: HEAD,
    scrollMargin: HEAD,
  });
  const columns = useMemo(() => columnsFor(assetClass, size.width, hidden), [assetClass, size.width, hidden]);
  const rows = virtual.getVirtualItems();
  const first = rows[0]?.index ?? 0;
  const last = rows[rows.length - 1]?.index ?? 0;
  // biome-ignore lint/correctness/useExhaustiveDependencies: the version says that pages came or went
  useEffect(() => book.need(first, last), [book, first, last, version]);

  const pageRows = Math.max(1, Math.floor((size.height - HEAD) / ROW) - 1);
  const press = useRegisterKeys({ register, columnCount: columns.length + 1, pageRows });
  useEffect(() => {
    if (cursor.row < total) virtual.scrollToIndex(cursor.row, { align: "auto" });
  }, [virtual, cursor.row, total]);

  const point = useCallback(
    (row: number, column: number, isExtending: boolean): void => {
      if (isExtending) {
        const [from, to] = [Math.min(cursor.row, row), Math.max(cursor.row, row)];
        const between = Array.from({ length: to - from + 1 }, (_, at) => book.rowAt(from + at));
        pick(
          between.filter((sale) => sale !== null),
          true,
        );
      }
      moveTo({ row, column });
      scroller.current?.querySelector("table")?.focus({ preventScroll: true });
    },
    [book, cursor.row, pick, moveTo],
  );
  const pickOne = useCallback((sale: Sale, isPicked: boolean) => pick([sale], isPicked), [pick]);
  const meant = useMemo(() => new Set(register.meant.map(({ id }) => id)), [register.meant]);
  const isInSight = cursor.row >= first && cursor.row <= last && rows.length > 0;
  const before = rows[0] === undefined ? 0 : rows[0].start - HEAD;
  const after = rows.length === 0 ? 0 : virtual.getTotalSize() + HEAD - rows[rows.length - 1]!.end;
  return (
    <div className={css.frame}>
      <div ref={scroller} className={css.scroller}>
        <table
          tabIndex={0}
          // biome-ignore lint/a11y/noNoninteractiveElementToInteractiveRole: a table whose cells are moved over by key is a grid
          role="grid"
          className={book.isStale && book.error === null ? `${css.grid} ${css.stale}` : css.grid}
          aria-label={`Sales of ${assetClass.name}`}
          aria-rowcount={total + 1}
          aria-multiselectable="true"
          aria-busy={book.isStale && book.error === null}
          aria-activedescendant={isInSight ? cellId(cursor.row, cursor.column) : undefined}
          data-column={columns[cursor.column - 1]?.id}
          onKeyDown={press}
          style={{ minWidth: widthOf(columns) }}
        >
          <colgroup>
            <col style={{ width: 24 }} />
            {columns.map(({ id, width }) => (
              <col key={id} style={id === "title" ? undefined : { width }} />
            ))}
          </colgroup>
          <RegisterHead
            columns={columns}
            query={register.query}
            evidence={evidence ?? NO_EVIDENCE}
            isEveryPicked={total > 0 && picked.size >= total}
            onSort={register.sortBy}
            onFilter={register.setFilter}
            onPickAll={onPickAll}
          />
          <Spacer height={before} columns={columns.length + 1} />
          <tbody>
            {rows.map(({ index }) => {
              const sale = book.rowAt(index);
              return (
                <RegisterRow
                  key={index}
                  index={index}
                  sale={sale}
                  columns={columns}
                  state={sale === null ? null : stateOf(sale)}
                  isPicked={sale !== null && picked.has(sale.id)}
                  isSettingAside={
                    sale !== null && asking === "setAside" && sale.setAside === null && meant.has(sale.id)
                  }
                  cursorColumn={index === cursor.row ? cursor.column : null}
                  onPoint={point}
                  onPick={pickOne}
                />
              );
            })}
          </tbody>
          <Spacer height={after} columns={columns.length + 1} />
        </table>
      </div>
      <ScrollRail
        book={book}
        version={version}
        stateOf={stateOf}
        height={size.height - HEAD}
        first={Math.floor(((virtual.scrollOffset ?? 0) + ROW - 1) / ROW)}
        rows={pageRows + 1}
        onGo={(row) => virtual.scrollToIndex(row, { align: "start" })}
      />
      <p className="vh" role="status">
        {book.total === null ? "" : `${formatNumber(total)} sales shown`}
      </p>
    </div>
  );
}

function Spacer({ height, columns }: { height: number; columns: number }) {
  if (height <= 0) return null;
  return (
    <tbody aria-hidden="true" className={css.spacer}>
      <tr>
        <td colSpan={columns} style={{ height }} />
      </tr>
    </tbody>
  );
}

function useSize(element: React.RefObject<HTMLDivElement | null>): { width: number; height: number } {
  const [size, setSize] = useState({ width: 940, height: 600 });
  useEffect(() => {
    if (element.current === null) return;
    const watch = new ResizeObserver(([entry]) => {
      if (entry !== undefined) setSize({ width: entry.contentRect.width, height: entry.contentRect.height });
    });
    watch.observe(element.current);
    return () => watch.disconnect();
  }, [element]);
  return size;
}
