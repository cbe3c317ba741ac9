/** Asks in place how sales were verified; the usual ways are one press each. */
import { useState } from "react";
import type { Sale } from "../../domain/sale.ts";
import { Button, SectionHeading } from "../parts/index.ts";
import css from "./EvidencePane.module.css";
import { saleAside, saleName } from "./SetAsideAsk.tsx";

const WAYS = ["hammer list", "invoice", "photos", "call"] as const;

export interface VerifyAskProps {
  readonly sales: readonly Sale[];
  readonly isBusy: boolean;
  readonly onVerify: (how: string) => void;
  readonly onCancel: () => void;
}

export function VerifyAsk({ sales, isBusy, onVerify, onCancel }: VerifyAskProps) {
  const [how, setHow] = useState("");
  return (
    <section className={css.section}>
      <SectionHeading aside={saleAside(sales)}>Verify {saleName(sales)}</SectionHeading>
      <form
        className={css.ask}
        onSubmit={(event) => {
          event.preventDefault();
          if (how.trim() !== "") onVerify(how.trim());
        }}
        onKeyDown={(event) => {
          if (event.key === "Escape") onCancel();
        }}
      >
        <p>
          How was {sales.length === 1 ? "it" : "each of them"} verified? Your name and today’s date are kept with it.
        </p>
        <div className={css.chips}>
          {WAYS.map((way) => (
            <Button key={way} onClick={() => onVerify(way)} disabled={isBusy}>
              {way}
            </Button>
          ))}
        </div>
        <input
          className={css.words}
          // biome-ignore lint/a11y/noAutofocus: the question was called for by the key or click just before
          autoFocus
          aria-label="How it was verified"
          placeholder="or in your own words"
          value={how}
          maxLength={200}
          onChange={(event) => setHow(event.target.value)}
        />
        <div className={css.acts}>
          <Button type="submit" primary disabled={how.trim() === "" || isBusy}>
            Verify
          </Button>
          <Button onClick={onCancel}>Not now</Button>
        </div>
      </form>
    </section>
  );
}
