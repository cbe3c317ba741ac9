/** Asks in place why sales are set aside, and says before what it would do to the price; or puts back what was set aside. */
import { useId, useState } from "react";
import type { PricePart } from "../../domain/appraisal.ts";
import { formatMoney, formatNumber, majorOf } from "../../domain/format.ts";
import type { Sale } from "../../domain/sale.ts";
import { Button, SectionHeading } from "../parts/index.ts";
import css from "./EvidencePane.module.css";
import type { SaleState } from "./evidenceState.ts";
import { REASONS, reasonOf, setAsideWords } from "./setAsideWords.ts";

export function saleName(sales: readonly Sale[]): string {
  const [first] = sales;
  return sales.length === 1 ? `sale ${first!.reference ?? first!.id}` : `${formatNumber(sales.length)} sales`;
}

/** "Tessaly TH-633, €36,850" for one sale; nothing for several. */
export function saleAside(sales: readonly Sale[]): string | undefined {
  const [sale] = sales;
  if (sale === undefined || sales.length > 1) return undefined;
  return `${sale.title}, ${formatMoney(majorOf(sale.priceMinor, sale.currencyCode), sale.currencyCode)}`;
}

export interface SetAsideAskProps {
  readonly sales: readonly Sale[];
  readonly stateOf: (sale: Sale) => SaleState;
  readonly priced: PricePart | null;
  readonly currencyCode: string;
  readonly isBusy: boolean;
  readonly onSetAside: (reason: string) => void;
  readonly onPutBack: () => void;
  readonly onCancel: () => void;
}

export function SetAsideAsk(props: SetAsideAskProps) {
  const { sales, stateOf, priced, currencyCode, isBusy, onSetAside, onPutBack, onCancel } = props;
  if (sales.every(({ setAside }) => setAside !== null)) {
    return <PutBackAsk sales={sales} isBusy={isBusy} onPutBack={onPutBack} onCancel={onCancel} />;
  }
  const open = sales.filter(({ setAside }) => setAside === null);
  const preview = setAsideWords(priced, open, open.map(stateOf), currencyCode);
  return <WhyAsk sales={open} preview={preview} isBusy={isBusy} onSetAside={onSetAside} onCancel={onCancel} />;
}

type WhyAskProps = Pick<SetAsideAskProps, "sales" | "isBusy" | "onSetAside" | "onCancel"> & {
  readonly preview: string;
};

function WhyAsk({ sales, preview, isBusy, onSetAside, onCancel }: WhyAskProps) {
  const [chosen, setChosen] = useState<string | null>(null);
  const [words, setWords] = useState("");
  const name = useId();
  const reason = reasonOf(chosen, words);
  return (
    <section className={css.section}>
      <SectionHeading aside={saleAside(sales)}>Set aside {saleName(sales)}</SectionHeading>
      <form
        className={css.ask}
        onSubmit={(event) => {
          event.preventDefault();
          if (reason !== "") onSetAside(reason);
        }}
        onKeyDown={(event) => {
          if (event.key === "Escape") onCancel();
        }}
      >
        <p>{preview}</p>
        <fieldset className={css.reasons}>
          <legend className="vh">Why it is set aside</legend>
          {REASONS.map((one, at) => (
            <label key={one}>
              <input
                type="radio"
                name={name}
                // biome-ignore lint/a11y/noAutofocus: the question was called for by the key or click just before
                autoFocus={at === 0}
                checked={chosen === one}
                onChange={() => setChosen(one)}
              />
              {one}
            </label>
          ))}
        </fieldset>
        <input
          className={css.words}
          aria-label="Reason in your own words"
          placeholder="In your own words, or more about it"
          value={words}
          maxLength={400}
          onChange={(event) => setWords(event.target.value)}
        />
        <div className={css.acts}>
          <Button type="submit" primary disabled={reason === "" || isBusy}>
            Set aside
          </Button>
          <Button onClick={onCancel}>Keep {sales.length === 1 ? "it" : "them"}</Button>
          <span className="fine soft">can be put back at any time</span>
        </div>
      </form>
    </section>
  );
}

type PutBackAskProps = Pick<SetAsideAskProps, "sales" | "isBusy" | "onPutBack" | "onCancel">;

function PutBackAsk({ sales, isBusy, onPutBack, onCancel }: PutBackAskProps) {
  const [first] = sales;
  return (
    <section className={css.section}>
      <SectionHeading aside={saleAside(sales)}>Put back {saleName(sales)}</SectionHeading>
      <div className={css.ask}>
        {first?.setAside && sales.length === 1 ? (
          <p>
            Set aside by {first.setAside.by} on {first.setAside.on}: {first.setAside.reason}.
          </p>
        ) : (
          <p>They count as evidence again where nothing else keeps them out.</p>
        )}
        <div className={css.acts}>
          <Button primary autoFocus disabled={isBusy} onClick={onPutBack}>
            Put back
          </Button>
          <Button onClick={onCancel}>Leave as {sales.length === 1 ? "it is" : "they are"}</Button>
        </div>
      </div>
    </section>
  );
}
