/** The valuer's own adjustments after the model's price, each with a reason that prints. */
import { useState } from "react";
import { formatSigned, readTypedNumber } from "../../domain/format.ts";
import { Button, SectionHeading } from "../parts/index.ts";
import css from "./Sheets.module.css";

export interface Adjustment {
  readonly label: string;
  readonly amount: number;
  readonly reason: string;
}

export interface AdjustmentsProps {
  readonly adjustments: readonly Adjustment[];
  readonly currencyCode: string;
  readonly onChange: (adjustments: readonly Adjustment[]) => void;
}

export function Adjustments({ adjustments, currencyCode, onChange }: AdjustmentsProps) {
  const [label, setLabel] = useState("");
  const [amount, setAmount] = useState("");
  const [reason, setReason] = useState("");
  const number = readTypedNumber(amount);
  const isUnread = amount.trim() !== "" && number === null;
  const isWhole = label.trim() !== "" && reason.trim() !== "" && number !== null;
  const add = () => {
    if (number === null) return;
    onChange([...adjustments, { label: label.trim(), amount: number, reason: reason.trim() }]);
    setLabel("");
    setAmount("");
    setReason("");
  };
  return (
    <section aria-labelledby="adjustments-heading">
      <SectionHeading id="adjustments-heading" aside={`${currencyCode}, after the model's price`}>
        Valuer’s own adjustments
      </SectionHeading>
      <ul className={css.adjustments}>
        {adjustments.map((one, index) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: two adjustments may be alike in every word
          <li key={index}>
            <b>{one.label}</b> {formatSigned(one.amount, Number.isInteger(one.amount) ? 0 : 2)}{" "}
            <span className="soft">{one.reason}</span>{" "}
            <Button onClick={() => onChange(adjustments.filter((_, other) => other !== index))}>Take out</Button>
          </li>
        ))}
      </ul>
      <form
        className={css.adjust}
        onSubmit={(event) => {
          event.preventDefault();
          if (isWhole) add();
        }}
      >
        <label>
          What for
          <input value={label} onChange={(event) => setLabel(event.target.value)} />
        </label>
        <label>
          Amount, + or −
          <input
            inputMode="decimal"
            aria-invalid={isUnread}
            value={amount}
            onChange={(event) => setAmount(event.target.value)}
          />
        </label>
        <label>
          Reason, which prints
          <input value={reason} onChange={(event) => setReason(event.target.value)} />
        </label>
        <Button type="submit" disabled={!isWhole}>
          Add
        </Button>
      </form>
      {isUnread ? (
        <p role="alert" className="brick small">
          “{amount}” can be read in more than one way, or in none. Write it with a point before decimals: 1,500.50.
        </p>
      ) : null}
    </section>
  );
}
