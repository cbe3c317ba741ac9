/** Which sales count: channels, days, verified only, the reference set; and every sale that does not, with its reason. */
import { formatNumber } from "../../domain/format.ts";
import type { PriceModel } from "../../domain/priceModel.ts";
import { CHANNEL_LABELS, CHANNELS } from "../../domain/sale.ts";
import { Field, SectionHeading } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { isInReferenceSet, setReferenceMember, switchChannel } from "./modelChanges.ts";
import css from "./PriceModelPlace.module.css";

export function EvidenceChoice({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const { changeModel } = bench;
  const { channels, verifiedOnly } = model.filter;
  return (
    <div className={css.section}>
      <SectionHeading>Which sales count</SectionHeading>
      <fieldset className={css.checks} style={{ marginTop: 6 }}>
        <legend className="fine soft">Sold through</legend>
        {CHANNELS.map((channel) => (
          <label key={channel}>
            <input
              type="checkbox"
              checked={channels === null || channels.includes(channel)}
              onChange={() => changeModel((now) => switchChannel(now, channel))}
            />
            {CHANNEL_LABELS[channel]}
          </label>
        ))}
        <label>
          <input
            type="checkbox"
            checked={verifiedOnly}
            onChange={() =>
              changeModel((now) => ({ ...now, filter: { ...now.filter, verifiedOnly: !now.filter.verifiedOnly } }))
            }
          />
          verified only
        </label>
      </fieldset>
      <div className={css.days}>
        <DayField bench={bench} label="Sold from" at="soldFrom" value={model.filter.soldFrom} />
        <DayField bench={bench} label="Sold to" at="soldTo" value={model.filter.soldTo} />
      </div>
      <ReferenceSet bench={bench} model={model} />
      <Account bench={bench} />
    </div>
  );
}

interface DayFieldProps {
  readonly bench: Workbench;
  readonly label: string;
  readonly at: "soldFrom" | "soldTo";
  readonly value: string | null;
}

function DayField({ bench, label, at, value }: DayFieldProps) {
  return (
    <Field label={label}>
      {(wiring) => (
        <input
          {...wiring}
          type="date"
          value={value ?? ""}
          onChange={(event) => {
            const day = event.target.value === "" ? null : event.target.value;
            bench.changeModel((now) => ({ ...now, filter: { ...now.filter, [at]: day } }));
          }}
        />
      )}
    </Field>
  );
}

function ReferenceSet({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const attributes = bench.assetClass?.attributes.filter((one) => !one.archived) ?? [];
  return (
    <fieldset className={css.checks} style={{ marginTop: 6 }}>
      <legend className="fine soft">Reference set: a sale counts when it has a value for each of these</legend>
      {attributes.map(({ key, kind, label }) => (
        <label key={key}>
          <input
            type="checkbox"
            checked={isInReferenceSet(model, key)}
            onChange={(event) => bench.changeModel((now) => setReferenceMember(now, key, kind, event.target.checked))}
          />
          {label}
        </label>
      ))}
    </fieldset>
  );
}

function Account({ bench }: { bench: Workbench }) {
  const evidence = bench.appraisal?.evidence;
  if (evidence === undefined) return null;
  return (
    <div style={{ marginTop: 8 }}>
      <p>
        <b>
          {formatNumber(evidence.used)} of {formatNumber(evidence.read)} sales count.
        </b>
        {evidence.out.length === 0 ? " None is left out." : ""}
      </p>
      <ul className={css.outs}>
        {evidence.out.map((out) => (
          <li key={out.sentence} className="small soft">
            {out.sentence}
          </li>
        ))}
      </ul>
    </div>
  );
}
