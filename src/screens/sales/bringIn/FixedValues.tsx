/** What the file does not say, said once for all its sales. */
import type { ColumnMatch } from "../../../domain/importRecord.ts";
import { CHANNEL_LABELS, CHANNELS, type Channel, type PriceBasis } from "../../../domain/sale.ts";
import { Field, SectionHeading } from "../../parts/index.ts";
import css from "./BringIn.module.css";
import { has } from "./targets.ts";

export interface FixedValuesProps {
  readonly match: ColumnMatch;
  readonly onChange: (match: ColumnMatch) => void;
}

const PREMIUM: Readonly<Record<PriceBasis["premium"], string>> = {
  in: "premium in the price",
  out: "premium on top",
  none: "no premium",
};
const TAX: Readonly<Record<PriceBasis["tax"], string>> = { in: "tax in the price", out: "tax on top" };

export function FixedValues({ match, onChange }: FixedValuesProps) {
  const { fixed } = match;
  const change = (part: Partial<ColumnMatch["fixed"]>): void => onChange({ ...match, fixed: { ...fixed, ...part } });
  const basis = (part: Partial<PriceBasis>): void => change({ priceBasis: { ...fixed.priceBasis, ...part } });
  return (
    <section aria-labelledby="fixed">
      <SectionHeading id="fixed" aside="for every sale of it">
        What the file does not say
      </SectionHeading>
      <div className={css.fixed}>
        {has(match, "soldOn") ? null : (
          <Field label="Sold on">
            {(wiring) => (
              <input
                {...wiring}
                type="date"
                value={fixed.soldOn ?? ""}
                onChange={(event) => change({ soldOn: event.target.value === "" ? null : event.target.value })}
              />
            )}
          </Field>
        )}
        <CurrencyField
          label={has(match, "currency") ? "Currency where a row has none" : "Currency"}
          code={fixed.currencyCode}
          onCode={(currencyCode) => change({ currencyCode })}
        />
        <Field label={has(match, "channel") ? "Sold through, where a row does not say" : "Sold through"}>
          {(wiring) => (
            <select
              {...wiring}
              value={fixed.channel}
              onChange={(event) => change({ channel: event.target.value as Channel })}
            >
              {CHANNELS.map((channel) => (
                <option key={channel} value={channel}>
                  {CHANNEL_LABELS[channel]}
                </option>
              ))}
            </select>
          )}
        </Field>
        {has(match, "source") ? null : (
          <Field label="Source">
            {(wiring) => (
              <input
                {...wiring}
                value={fixed.source}
                placeholder="whose list this is"
                maxLength={200}
                onChange={(event) => change({ source: event.target.value })}
              />
            )}
          </Field>
        )}
        {has(match, "premium") ? null : (
          <Field label="Buyer’s premium">
            {(wiring) => (
              <select
                {...wiring}
                value={fixed.priceBasis.premium}
                onChange={(event) => basis({ premium: event.target.value as PriceBasis["premium"] })}
              >
                {Object.entries(PREMIUM).map(([value, label]) => (
                  <option key={value} value={value}>
                    {label}
                  </option>
                ))}
              </select>
            )}
          </Field>
        )}
        {has(match, "tax") ? null : (
          <Field label="Tax">
            {(wiring) => (
              <select
                {...wiring}
                value={fixed.priceBasis.tax}
                onChange={(event) => basis({ tax: event.target.value as PriceBasis["tax"] })}
              >
                {Object.entries(TAX).map(([value, label]) => (
                  <option key={value} value={value}>
                    {label}
                  </option>
                ))}
              </select>
            )}
          </Field>
        )}
      </div>
    </section>
  );
}

/** Three capital letters; kept only once it is a code, so that a half-typed one refuses nothing. */
function CurrencyField({ label, code, onCode }: { label: string; code: string; onCode: (code: string) => void }) {
  return (
    <Field label={label}>
      {(wiring) => (
        <input
          {...wiring}
          key={code}
          defaultValue={code}
          maxLength={3}
          onChange={(event) => {
            const next = event.target.value.toUpperCase();
            if (/^[A-Z]{3}$/.test(next) && next !== code) onCode(next);
          }}
        />
      )}
    </Field>
  );
}
