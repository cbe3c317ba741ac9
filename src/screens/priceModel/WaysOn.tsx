/** The ways on where attributes move together: each worked out before it is applied, with a link that applies it. */
import { useMemo } from "react";
import type { RequestInput } from "../../contract/requests.ts";
import { formatNumber, formatPercent, roundingStep, roundOutward, roundTo } from "../../domain/format.ts";
import type { MovingReport, WayOn } from "../../domain/movingTogether.ts";
import { rowStep } from "../charts/figures.ts";
import { TextLink } from "../parts/index.ts";
import { isBlank } from "../workbench/blank.ts";
import { useRead } from "../workbench/useTask.ts";
import type { Workbench } from "../workbench/workbench.ts";
import css from "./WaysOn.module.css";

const LEVEL = 0.9;

/** What moves together and each way on, for the model and item on the table; null until it is known. */
export function useWaysOn({ client, classId, model, subject, assetClass }: Workbench): MovingReport | null {
  const dataStamp = assetClass?.dataVersion ?? 0;
  // biome-ignore lint/correctness/useExhaustiveDependencies: the stamp says that the data behind the same question changed
  const ask = useMemo(() => {
    if (classId === null || model === null) return null;
    const item = subject === null || isBlank(subject) ? null : subject;
    return () => client.ask("waysOn", { classId, model, subject: item, level: LEVEL } as RequestInput<"waysOn">);
  }, [client, classId, model, subject, dataStamp]);
  return useRead(ask).value;
}

export function WaysOn({ bench, found }: { bench: Workbench; found: MovingReport }) {
  const { groups, ways, priceSentence, currencyCode } = found;
  return (
    <div className="small">
      <p>
        <b>{found.sentence}</b> {priceSentence}
      </p>
      {groups.slice(1).map(({ sentence }) => (
        <p key={sentence} className="soft">
          {sentence}
        </p>
      ))}
      {ways.length === 0 ? null : (
        <div className={css.scroll}>
          <table className={css.ways}>
            <caption>
              Ways on, each worked out before it is applied, {currencyCode}: price with 9 in 10, what the coefficients
              then read with 19 in 20
            </caption>
            <thead>
              <tr>
                <th scope="col">way</th>
                <th scope="col" className="num">
                  price
                </th>
                <th scope="col" className="num">
                  error
                </th>
                <th scope="col">
                  <span className="vh">apply</span>
                </th>
              </tr>
            </thead>
            <tbody>
              {ways.map((way) => (
                <Way key={way.label} way={way} bench={bench} />
              ))}
            </tbody>
          </table>
        </div>
      )}
    </div>
  );
}

function Way({ way, bench }: { way: WayOn; bench: Workbench }) {
  const { label, kind, price, looTypicalError, refused, reads, model } = way;
  if (refused !== null) {
    return (
      <tr>
        <th scope="row">{label}</th>
        <td colSpan={3}>{refused}</td>
      </tr>
    );
  }
  const step = price === null ? 1 : roundingStep(price);
  const ends = price === null ? null : roundOutward(price, step);
  return (
    <>
      <tr className={css.way}>
        <th scope="row">{label}</th>
        <td className="num">
          {price === null || ends === null ? (
            "no item"
          ) : (
            <>
              {formatNumber(roundTo(price.amount, step))}
              <br />
              <span className="soft">
                {formatNumber(ends.low)}–{formatNumber(ends.high)}
              </span>
            </>
          )}
        </td>
        <td className="num">{looTypicalError === null ? "" : formatPercent(looTypicalError, 2)}</td>
        <td>
          {kind === "keep" ? (
            <span className="soft">in use</span>
          ) : (
            <TextLink onPress={() => bench.changeModel(() => model)}>Use this</TextLink>
          )}
        </td>
      </tr>
      <tr className={css.reads}>
        <td colSpan={4}>
          {reads.map((one) => (
            <div key={`${one.key} ${one.label}`}>
              {one.label}: {moneyTo(stepOf(one), one.money)}{" "}
              <span className="soft">
                ({moneyTo(stepOf(one), one.low95)} to {moneyTo(stepOf(one), one.high95)}) per {one.stepWords}
              </span>
            </div>
          ))}
        </td>
      </tr>
    </>
  );
}

function stepOf({ money, low95, high95 }: WayOn["reads"][number]): number {
  return rowStep({ own: Math.max(Math.abs(low95 ?? 0), Math.abs(high95 ?? 0)), coefficient: money ?? 0 });
}

function moneyTo(step: number, amount: number | null): string {
  return amount === null ? "not known" : formatNumber(roundTo(amount, step));
}
