// What "fit" means in the benchmark: from columns in memory to every coefficient and standard error, unrefined.
import { accumulateMoments } from "../../src/numerics/accumulateMoments.ts";
import { type LiveAnswer, openLiveFit } from "../../src/numerics/liveFit.ts";
import type { BenchData } from "./drawData.ts";

export function fitFast({ columns, response }: Pick<BenchData, "columns" | "response">): LiveAnswer {
  const moments = accumulateMoments([...columns, response]);
  return openLiveFit(moments, [...columns.keys()]).answer();
}
