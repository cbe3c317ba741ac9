/** Everything about the sale under the cursor: what found no room in the register stands here. */
import type { AssetClass } from "../../domain/assetClass.ts";
import { formatDay } from "../../domain/format.ts";
import { priceBasisWords, type Sale } from "../../domain/sale.ts";
import { SectionHeading } from "../parts/index.ts";
import { valueText } from "./columns.ts";
import css from "./EvidencePane.module.css";
import { saleAside, saleName } from "./SetAsideAsk.tsx";

export function SaleDetail({ sale, assetClass }: { sale: Sale; assetClass: AssetClass }) {
  const { verification, setAside } = sale;
  const facts: readonly (readonly [string, string])[] = [
    ["Sold on", `${formatDay(sale.soldOn)}, ${sale.channel}`],
    ...assetClass.attributes
      .filter(({ archived }) => !archived)
      .map((attribute): readonly [string, string] => {
        const words = valueText(attribute, sale.values[attribute.key], sale.soldOn);
        const unit =
          attribute.kind === "built" ? " years at sale" : attribute.unit === null ? "" : ` ${attribute.unit}`;
        return [attribute.label, words === "" ? "not known" : `${words}${unit}`];
      }),
    ["Price basis", `${sale.currencyCode}, ${priceBasisWords(sale.priceBasis)}`],
    [
      "Source",
      [sale.source, sale.fileRow === null ? "" : `row ${sale.fileRow}`].filter((part) => part !== "").join(", "),
    ],
    [
      "Verified",
      verification === null ? "not yet" : `${verification.how}, by ${verification.by}, ${formatDay(verification.on)}`,
    ],
    ["Set aside", setAside === null ? "" : `${setAside.reason}, by ${setAside.by}, ${formatDay(setAside.on)}`],
    ["Notes", sale.notes],
  ];
  return (
    <section className={css.section} aria-label="The sale under the cursor">
      <SectionHeading aside={saleAside([sale])}>{saleName([sale]).replace(/^s/, "S")}</SectionHeading>
      <dl className={css.detail}>
        {facts
          .filter(([, words]) => words !== "")
          .map(([label, words]) => (
            <div key={label} style={{ display: "contents" }}>
              <dt>{label}</dt>
              <dd>{words}</dd>
            </div>
          ))}
      </dl>
    </section>
  );
}
