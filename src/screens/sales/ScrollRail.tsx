/** Where the window onto the register stands, and where set-aside sales and missing values lie, as far as they have been read. */
import { memo } from "react";
import type { Sale } from "../../domain/sale.ts";
import type { SaleState } from "./evidenceState.ts";
import type { PageBook } from "./pageBook.ts";
import css from "./Register.module.css";

export interface ScrollRailProps {
  readonly book: PageBook;
  readonly version: number;
  readonly stateOf: (sale: Sale) => SaleState;
  readonly height: number;
  readonly first: number;
  readonly rows: number;
  readonly onGo: (row: number) => void;
}

const WIDTH = 14;
const SMALLEST_WINDOW = 8;

export function ScrollRail({ book, version, stateOf, height, first, rows, onGo }: ScrollRailProps) {
  const total = book.total ?? 0;
  if (total <= rows || height <= 0) return <div className={css.railBeside} />;
  const at = (row: number): number => (row / total) * height;
  const windowHeight = Math.max(SMALLEST_WINDOW, (rows / total) * height);
  return (
    <div className={css.railBeside}>
      <svg
        width={WIDTH}
        height={height}
        aria-hidden="true"
        onPointerDown={(event) => {
          const share = (event.clientY - event.currentTarget.getBoundingClientRect().top) / height;
          onGo(Math.max(0, Math.round(share * total - rows / 2)));
        }}
      >
        <rect width={WIDTH} height={height} className="f-none" pointerEvents="all" />
        <path d={`M.5 0V${height}M${WIDTH - 0.5} 0V${height}`} className="s-rule" />
        <Marks book={book} version={version} stateOf={stateOf} height={height} total={total} />
        <rect
          x="0.8"
          y={Math.min(at(first), height - windowHeight)}
          width={WIDTH - 1.6}
          height={windowHeight}
          className="f-none s-verd"
          strokeWidth="1.6"
        />
      </svg>
    </div>
  );
}

type MarksProps = Pick<ScrollRailProps, "book" | "version" | "stateOf" | "height"> & { readonly total: number };

const Marks = memo(function Marks({ book, stateOf, height, total }: MarksProps) {
  const lines: Record<"setAside" | "missing", string[]> = { setAside: [], missing: [] };
  for (const [row, sale] of book.rows()) {
    const { mark } = stateOf(sale);
    const y = (((row + 0.5) / total) * height).toFixed(1);
    if (mark === "setAside") lines.setAside.push(`M2 ${y}h10`);
    if (mark === "missing") lines.missing.push(`M2 ${y}h5`);
  }
  return (
    <>
      <path d={lines.setAside.join("")} className="s-ink" strokeWidth="1.6" />
      <path d={lines.missing.join("")} className="s-brass" strokeWidth="1.6" />
    </>
  );
});
