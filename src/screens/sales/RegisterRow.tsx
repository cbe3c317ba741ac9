/** One sale as a row of the register: its state as a mark and words, never by colour alone. */
import { memo } from "react";
import type { Sale } from "../../domain/sale.ts";
import { channelText, priceText, type RegisterColumn, soldText, valueText } from "./columns.ts";
import type { SaleState } from "./evidenceState.ts";
import css from "./Register.module.css";

export interface RegisterRowProps {
  readonly index: number;
  /** Null while its page is on the way. */
  readonly sale: Sale | null;
  readonly columns: readonly RegisterColumn[];
  readonly state: SaleState | null;
  readonly isPicked: boolean;
  /** Being asked about in the pane beside. */
  readonly isSettingAside: boolean;
  /** The column the cursor stands in, or null when it stands in another row. */
  readonly cursorColumn: number | null;
  readonly onPoint: (row: number, column: number, isExtending: boolean) => void;
  readonly onPick: (sale: Sale, isPicked: boolean) => void;
}

const MARKS: Readonly<Record<SaleState["mark"], string | undefined>> = {
  in: css.stateIn,
  setAside: css.stateOut,
  filtered: css.stateFiltered,
  missing: css.stateMissing,
  unknown: css.stateUnknown,
};

export function cellId(row: number, column: number): string {
  return `sale-cell-${row}-${column}`;
}

export const RegisterRow = memo(function RegisterRow(props: RegisterRowProps) {
  const { index, sale, columns, state, isPicked, isSettingAside, cursorColumn, onPoint, onPick } = props;
  const isOut = state !== null && state.mark !== "in" && state.mark !== "unknown";
  const classes = [css.row, isOut ? css.out : "", state?.mark === "setAside" ? css.struck : ""];
  if (isPicked) classes.push(css.picked);
  return (
    <tr
      aria-rowindex={index + 2}
      aria-selected={isPicked}
      className={classes.join(" ")}
      onClick={(event) => {
        const cell = (event.target as HTMLElement).closest("td");
        onPoint(index, cell === null ? 0 : cell.cellIndex, event.shiftKey);
      }}
    >
      <td id={cellId(index, 0)} className={cursorColumn === 0 ? css.cursor : undefined}>
        {sale === null ? null : (
          <input
            type="checkbox"
            tabIndex={-1}
            aria-label={`Pick sale ${sale.reference ?? sale.id}`}
            checked={isPicked}
            onChange={(event) => onPick(sale, event.target.checked)}
          />
        )}
      </td>
      {columns.map((column, at) => (
        <td
          key={column.id}
          id={cellId(index, at + 1)}
          className={[column.isNumber ? "num" : "", cursorColumn === at + 1 ? css.cursor : ""].join(" ")}
        >
          {sale === null ? (
            <span className={css.waiting} />
          ) : (
            <Cell column={column} sale={sale} state={isSettingAside ? null : state} />
          )}
        </td>
      ))}
    </tr>
  );
});

function Cell({ column, sale, state }: { column: RegisterColumn; sale: Sale; state: SaleState | null }) {
  switch (column.id) {
    case "reference":
      return sale.reference ?? String(sale.id);
    case "soldOn":
      return soldText(sale);
    case "title":
      return <Title title={sale.title} />;
    case "channel":
      return channelText(sale);
    case "price":
      return <Price sale={sale} column={column} />;
    case "verified":
      return <Verified sale={sale} />;
    case "state":
      return <State state={state} />;
    default: {
      if (column.attribute === null) return null;
      const words = valueText(column.attribute, sale.values[column.id], sale.soldOn);
      return words === "" ? <Missing /> : words;
    }
  }
}

function Missing() {
  return (
    <span className={css.missing} title="not known">
      <span aria-hidden="true">–</span>
      <span className="vh">not known</span>
    </span>
  );
}

/** The maker stands out, the model reads on. */
function Title({ title }: { title: string }) {
  const [first = "", ...rest] = title.split(" ");
  return (
    <span title={title}>
      {first} <span className="soft">{rest.join(" ")}</span>
    </span>
  );
}

function Price({ sale, column }: { sale: Sale; column: RegisterColumn }) {
  const isOther = sale.currencyCode !== column.heading;
  return (
    <span className={css.price}>
      {priceText(sale)}
      {isOther ? ` ${sale.currencyCode}` : ""}
    </span>
  );
}

function Verified({ sale: { verification } }: { sale: Sale }) {
  if (verification === null) {
    return (
      <span className="soft">
        <span className={css.unverified} aria-hidden="true" />
        not yet
      </span>
    );
  }
  const { by, how, on } = verification;
  return (
    <span title={`${how}, by ${by} on ${on}`}>
      <span className={css.verified} aria-hidden="true" />
      {[initialsOf(by), how].filter((part) => part !== "").join(", ")}
    </span>
  );
}

/** "M. Ansell" → "MA"; nothing for "not stated", which is no name. */
export function initialsOf(name: string): string {
  if (!/\p{Lu}/u.test(name)) return "";
  const parts = name.split(/[\s.,]+/).filter((part) => part !== "");
  return parts.length <= 1 ? name : parts.map((part) => part.charAt(0).toUpperCase()).join("");
}

function State({ state }: { state: SaleState | null }) {
  if (state === null) {
    return (
      <b>
        <span className={css.stateChanged} aria-hidden="true" />
        setting aside
      </b>
    );
  }
  return (
    <span title={state.words}>
      <span className={MARKS[state.mark]} aria-hidden="true" />
      {state.words}
    </span>
  );
}
