/** What the range takes for granted and promises, and another kind of range to judge it by. */
import type { PriceEstimate } from "../../domain/appraisal.ts";
import { formatMoney, roundOutward } from "../../domain/format.ts";
import type { RangeKind } from "../../domain/priceModel.ts";
import css from "./AppraisePlace.module.css";

const NAMES: Readonly<Record<RangeKind, string>> = {
  exact: "Exact",
  "jackknife+": "Jackknife+",
  "cv+": "CV+",
  variance: "Width following the price",
};

interface RangeNoteProps {
  readonly price: PriceEstimate;
  readonly level: number;
  readonly step: number;
  readonly currencyCode: string;
}

export function RangeNote({ price, level, step, currencyCode }: RangeNoteProps) {
  const { range } = price;
  if (range === undefined) return null;
  const other = range.beside?.ranges.find((one) => one.level === level) ?? null;
  const ends = other === null ? null : roundOutward(other, step);
  return (
    <p className={css.rangeNote}>
      {range.insteadOf === null ? null : <span className="brass">{range.insteadOf} </span>}
      <b>{NAMES[range.kind]}.</b> {range.sentence}
      {range.guarantee === null ? null : <span className="soft"> {range.guarantee}</span>}
      {ends === null ? null : (
        <span className="soft">
          {" "}
          {NAMES[range.beside!.kind]} beside it: {formatMoney(ends.low, currencyCode)} to{" "}
          {formatMoney(ends.high, currencyCode)}.
        </span>
      )}
      {range.disagreement === null ? null : <span className="brass"> {range.disagreement}</span>}
    </p>
  );
}
