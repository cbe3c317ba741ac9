/** A line for each left-out attribute: what it would say, what it would change and how far the price would move; a link puts it in. */
import { useMemo } from "react";
import type { RequestInput } from "../../contract/requests.ts";
import { formatNumber, formatSigned, lowerStart, roundTo } from "../../domain/format.ts";
import type { PuttingIn } from "../../domain/puttingIn.ts";
import { rowStep } from "../charts/figures.ts";
import { TextLink } from "../parts/index.ts";
import { isBlank } from "../workbench/blank.ts";
import { useRead } from "../workbench/useTask.ts";
import type { Workbench } from "../workbench/workbench.ts";

/** Null until it is known, and where nothing is left out. */
export function usePutIn(bench: Workbench, averagePrice: number, isAsked: boolean): readonly PuttingIn[] | null {
  const { client, classId, model, subject, assetClass } = bench;
  const dataStamp = assetClass?.dataVersion ?? 0;
  // biome-ignore lint/correctness/useExhaustiveDependencies: the stamp says that the data behind the same question changed
  const ask = useMemo(() => {
    if (classId === null || model === null || !isAsked) return null;
    const item = subject === null || isBlank(subject) ? null : subject;
    return () => client.ask("ifPutIn", { classId, model, subject: item, averagePrice } as RequestInput<"ifPutIn">);
  }, [client, classId, model, subject, averagePrice, isAsked, dataStamp]);
  return useRead(ask).value;
}

export function PutInLines({ bench, found }: { readonly bench: Workbench; readonly found: readonly PuttingIn[] }) {
  const putIn = (key: string): void =>
    bench.changeModel((now) => ({ ...now, leftOut: now.leftOut.filter((one) => one !== key) }));
  return (
    <ul className="small soft" style={{ listStyle: "none", marginTop: 4 }}>
      {found.map((one) => (
        <li key={one.key}>
          {putInWords(one)} <TextLink onPress={() => putIn(one.key)}>Put it in</TextLink>
        </li>
      ))}
    </ul>
  );
}

const NAMED = 2;

/** "With age in: age itself −1,630 (1 year); hours −2,140 → −710 (1,000 h); the price would move by +1,200." */
export function putInWords({ label, own, changes, priceMove }: PuttingIn): string {
  const amount = (value: number, step: number): string => formatSigned(roundTo(value, step));
  const itself = own.map(({ level, stepWords, money }) => {
    const name = level === null || level === "yes" ? "itself" : level;
    return `${name} ${amount(money, rowStep({ own: money, coefficient: money }))} (${stepWords})`;
  });
  const most = [...changes].sort((a, b) => Math.abs(b.to - b.from) - Math.abs(a.to - a.from)).slice(0, NAMED);
  const others = most.map(({ label: name, level, stepWords, from, to }) => {
    const step = rowStep({ own: from, coefficient: to });
    const which = level === null || level === "yes" ? lowerStart(name) : `${lowerStart(name)} ${level}`;
    return `${which} ${formatNumber(roundTo(from, step))} → ${formatNumber(roundTo(to, step))} (${stepWords})`;
  });
  const price =
    priceMove === null
      ? "the value of the item is not known, so no price with it"
      : `the price would move by ${amount(priceMove, rowStep({ own: priceMove, coefficient: priceMove }))}`;
  return `With ${lowerStart(label)} in: ${[...itself, ...others, price].join("; ")}.`;
}
