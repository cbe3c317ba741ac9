/** Verbs that work on a store: opened from --store, asked by the same requests as the screens, closed whatever happens. */
import { type Ask, askingOver } from "../asking.ts";
import { openWorkshop, type WorkshopOptions } from "../openWorkshop.ts";
import { refuse } from "./verb.ts";

export async function withStore<T>(options: WorkshopOptions, work: (ask: Ask) => Promise<T>): Promise<T> {
  const workshop = openWorkshop(options);
  try {
    return await work(askingOver(workshop.ask));
  } finally {
    workshop.close();
  }
}

/** The class by name (case aside) or number, or null. */
export async function findClass(ask: Ask, nameOrId: string): Promise<number | null> {
  const classes = await ask("listClasses", {});
  const wanted = nameOrId.trim().toLowerCase();
  const found =
    classes.find(({ name }) => name.toLowerCase() === wanted) ?? classes.find(({ id }) => String(id) === wanted);
  return found?.id ?? null;
}

/** The class, or a refusal that names the classes there are. */
export async function requireClass(ask: Ask, nameOrId: string): Promise<number> {
  const id = await findClass(ask, nameOrId);
  if (id !== null) return id;
  const names = (await ask("listClasses", {})).map(({ name }) => name).join(", ");
  const hint =
    names === "" ? "The store has no asset class yet; import a file of sales to start one." : `Use one of: ${names}.`;
  throw refuse("no-such-class", `There is no asset class "${nameOrId}" in this store.`, "--class", hint);
}
