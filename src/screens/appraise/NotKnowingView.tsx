/** What the range is made of when something is not known, and what assuming a value instead would read. */
import type { NotKnowing } from "../../domain/appraisal.ts";
import { formatMoney, formatPercent, roundTo } from "../../domain/format.ts";
import { SectionHeading } from "../parts/index.ts";
import css from "./AppraisePlace.module.css";

interface NotKnowingViewProps {
  readonly found: NotKnowing;
  readonly amount: number;
  readonly step: number;
  readonly currencyCode: string;
}

const PARTS = [
  { key: "noise", label: "how sales differ anyway", fill: "var(--slate)" },
  { key: "notKnowing", label: "not knowing", fill: "var(--brass)" },
  { key: "estimation", label: "how well the model is known", fill: "var(--verdigris)" },
] as const;

export function NotKnowingView({ found, amount, step, currencyCode }: NotKnowingViewProps) {
  const money = (value: number): string => formatMoney(roundTo(value, step), currencyCode);
  return (
    <section aria-labelledby="not-knowing">
      <SectionHeading id="not-knowing" aside={`${Math.round(found.level * 100)} % range, squared`}>
        What the range is made of
      </SectionHeading>
      <p className="small">{found.sentence}</p>
      <Bar shares={found.shares} />
      <table className={css.assumed}>
        <caption className="vh">Priced as not known, and with assumed values</caption>
        <tbody>
          <tr>
            <th scope="row">priced as not known</th>
            <td>
              <b>{money(amount)}</b>
            </td>
            <td>{money(found.width)} wide</td>
          </tr>
          {found.assumed.map((one) => (
            <tr key={one.code}>
              <th scope="row" className="soft">
                {one.label}
              </th>
              <td>{money(one.amount)}</td>
              <td className="soft">{money(one.high - one.low)} wide</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function Bar({ shares }: Pick<NotKnowing, "shares">) {
  const words = PARTS.map(({ key, label }) => `${formatPercent(shares[key])} ${label}`).join(", ");
  let from = 0;
  return (
    <>
      <svg width="100%" height="12" role="img" aria-label={words}>
        {PARTS.map(({ key, fill }) => {
          const start = from;
          from += shares[key];
          return <rect key={key} x={`${start * 100}%`} width={`${shares[key] * 100}%`} height="12" fill={fill} />;
        })}
      </svg>
      <p className="fine soft">
        {PARTS.map(({ key, label, fill }) => (
          <span key={key} style={{ marginRight: 14 }}>
            <svg width="9" height="9" aria-hidden="true" style={{ display: "inline-block", marginRight: 5 }}>
              <rect width="9" height="9" fill={fill} />
            </svg>
            {label} {formatPercent(shares[key])}
          </span>
        ))}
      </p>
    </>
  );
}
