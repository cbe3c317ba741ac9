/** Column heads: a press sorts, a mark shows which way; under numbers the hairline that filters. */
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import type { RegisterColumn } from "./columns.ts";
import { NO_VALUE_FILTER, withValue } from "./filters.ts";
import type { SalesFilter, SalesQuery } from "./pageBook.ts";
import { RangeHandles } from "./RangeHandles.tsx";
import css from "./Register.module.css";

export interface RegisterHeadProps {
  readonly columns: readonly RegisterColumn[];
  readonly query: SalesQuery;
  readonly evidence: readonly AttributeEvidence[];
  readonly isEveryPicked: boolean;
  readonly onSort: (id: string) => void;
  readonly onFilter: (filter: SalesFilter) => void;
  readonly onPickAll: (isPicked: boolean) => void;
}

/** Columns that a page can be sorted by; every other has a head without a button. */
export function RegisterHead(props: RegisterHeadProps) {
  const { columns, query, evidence, isEveryPicked, onSort, onFilter, onPickAll } = props;
  return (
    <thead>
      <tr aria-rowindex={1}>
        <th scope="col" className={css.pickHead}>
          <input
            type="checkbox"
            aria-label="Pick every sale that is shown"
            checked={isEveryPicked}
            onChange={(event) => onPickAll(event.target.checked)}
          />
        </th>
        {columns.map((column) => (
          <Head key={column.id} column={column} query={query} evidence={evidence} onSort={onSort} onFilter={onFilter} />
        ))}
      </tr>
    </thead>
  );
}

type HeadProps = Pick<RegisterHeadProps, "query" | "evidence" | "onSort" | "onFilter"> & {
  readonly column: RegisterColumn;
};

function Head({ column, query, evidence, onSort, onFilter }: HeadProps) {
  const isSorted = query.sort.by === column.id;
  const direction = query.sort.descending ? "descending" : "ascending";
  const spread = evidence.find(({ key }) => key === column.attribute?.key)?.spread ?? null;
  const part = query.filter.values[column.id] ?? NO_VALUE_FILTER;
  return (
    <th scope="col" className={column.isNumber ? "num" : undefined} aria-sort={isSorted ? direction : "none"}>
      <button type="button" onClick={() => onSort(column.id)} title={`Sort by ${column.heading}`}>
        {column.heading}
        {isSorted ? <span aria-hidden="true">{query.sort.descending ? " ↓" : " ↑"}</span> : null}
      </button>
      <div className={css.rail}>
        {spread === null || column.attribute === null ? null : (
          <RangeHandles
            spread={spread}
            decimals={column.attribute.kind === "built" ? 1 : column.attribute.decimals}
            low={part.low}
            high={part.high}
            width={Math.min(46, column.width - 10)}
            onChange={(range) => onFilter(withValue(query.filter, column.id, range))}
          />
        )}
      </div>
    </th>
  );
}
