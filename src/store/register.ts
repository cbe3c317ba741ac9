/**
 * The register's page: which sale numbers, in which order, and how many in all. Two ways to one answer: walk the index of the
 * sort key and pass over what the filter leaves out (many hits), or collect the hits and sort them (few hits).
 */
import type { Database } from "better-sqlite3";
import { DAYS_PER_YEAR, type Day } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { Channel } from "../domain/sale.ts";
import { type StoredAttribute, valuesIndex, valuesTable } from "./attributeTables.ts";
import { channelCode, requireDay } from "./saleRows.ts";

/** By attribute: numbers between (built: age at sale in years), any of these levels ("yes"/"no"), or not known. */
export interface ValueFilter {
  readonly low: number | null;
  readonly high: number | null;
  readonly levels: readonly string[] | null;
  /** true: also (or, alone, only) those not known; false: only those known. */
  readonly missing: boolean | null;
}

export interface RegisterFilter {
  readonly search: string;
  readonly soldFrom: Day | null;
  readonly soldTo: Day | null;
  readonly channels: readonly Channel[] | null;
  readonly state: "any" | "in" | "setAside";
  readonly verified: "any" | "yes" | "no";
  readonly batchId: number | null;
  readonly values: Readonly<Record<string, ValueFilter>>;
}

export interface RegisterQuery {
  readonly classId: number;
  readonly offset: number;
  readonly limit: number;
  readonly sort: { readonly by: string; readonly descending: boolean };
  readonly filter: RegisterFilter;
}

type Param = string | number;

/** A condition and the tables it speaks of: s sales, v the wide table. */
interface Condition {
  readonly sql: string;
  readonly params: readonly Param[];
  readonly tables: "s" | "v" | "sv";
}

/** Hits below this are collected and sorted; above it the walk along the index finds a page soon enough. */
const FEW = 4000;

const BUILT_IN_SORTS: Readonly<Record<string, { column: string; index: string }>> = {
  soldOn: { column: "s.sold_on", index: "sales_by_sold_on" },
  price: { column: "s.price_minor", index: "sales_by_price" },
  title: { column: "s.title COLLATE NOCASE", index: "sales_by_title" },
  channel: { column: "s.channel", index: "sales_by_channel" },
  reference: { column: "s.reference COLLATE NOCASE", index: "sales_by_reference" },
  verified: { column: "s.verified_on", index: "sales_by_verified" },
  state: { column: "s.set_aside_on", index: "sales_by_set_aside" },
};

function noSuchKey(key: string): never {
  throw new AppError({
    family: "request",
    code: "no-such-attribute",
    what: `Sales can't be sorted or filtered by "${key}": the class has no such attribute.`,
    where: key,
    whatToDo: "Choose one of the class's attributes.",
  });
}

function levelCodes(stored: StoredAttribute, levels: readonly string[]): number[] {
  const names: readonly string[] = stored.attribute.kind === "yesNo" ? ["no", "yes"] : stored.attribute.levels;
  return levels.map((level) => names.indexOf(level)).filter((code) => code >= 0);
}

function valueCondition(stored: StoredAttribute, filter: ValueFilter): Condition | null {
  const column = `v.${stored.column}`;
  const isBuilt = stored.attribute.kind === "built";
  const measured = isBuilt ? `(s.sold_on - ${column}) / ${DAYS_PER_YEAR}` : column;
  const parts: string[] = [];
  const params: Param[] = [];
  if (filter.low !== null) {
    parts.push(`${measured} >= ?`);
    params.push(filter.low);
  }
  if (filter.high !== null) {
    parts.push(`${measured} <= ?`);
    params.push(filter.high);
  }
  if (filter.levels !== null) {
    const codes = levelCodes(stored, filter.levels);
    parts.push(`${column} IN (${codes.join(", ")})`);
  }
  const wanted = parts.join(" AND ");
  const tables = isBuilt && params.length > 0 ? "sv" : "v";
  if (filter.missing === null) return parts.length === 0 ? null : { sql: wanted, params, tables };
  if (!filter.missing) return { sql: [`${column} IS NOT NULL`, ...parts].join(" AND "), params, tables };
  return { sql: parts.length === 0 ? `${column} IS NULL` : `((${wanted}) OR ${column} IS NULL)`, params, tables };
}

function searchCondition(search: string): Condition | null {
  const text = search.trim();
  if (text === "") return null;
  const like = `%${text.replace(/[\\%_]/g, "\\$&")}%`;
  const sql = `(s.title LIKE ? ESCAPE '\\' OR s.reference LIKE ? ESCAPE '\\' OR s.notes LIKE ? ESCAPE '\\'
    OR s.source_id IN (SELECT id FROM sources WHERE name LIKE ? ESCAPE '\\'))`;
  return { sql, params: [like, like, like, like], tables: "s" };
}

function onSale(sql: string, ...params: Param[]): Condition {
  return { sql, params, tables: "s" };
}

function conditionsOf(filter: RegisterFilter, attributes: readonly StoredAttribute[]): Condition[] {
  const found: (Condition | null)[] = [
    searchCondition(filter.search),
    filter.soldFrom === null ? null : onSale("s.sold_on >= ?", requireDay(filter.soldFrom, "sold from")),
    filter.soldTo === null ? null : onSale("s.sold_on <= ?", requireDay(filter.soldTo, "sold to")),
    filter.channels === null ? null : onSale(`s.channel IN (${filter.channels.map(channelCode).join(", ")})`),
    filter.state === "any" ? null : onSale(`s.set_aside_on IS ${filter.state === "in" ? "NULL" : "NOT NULL"}`),
    filter.verified === "any" ? null : onSale(`s.verified_on IS ${filter.verified === "no" ? "NULL" : "NOT NULL"}`),
    filter.batchId === null ? null : onSale("s.batch_id = ?", filter.batchId),
  ];
  for (const [key, valueFilter] of Object.entries(filter.values)) {
    const stored = attributes.find(({ attribute }) => attribute.key === key) ?? noSuchKey(key);
    found.push(valueCondition(stored, valueFilter));
  }
  return found.filter((condition) => condition !== null);
}

interface SortKey {
  readonly table: "s" | "v";
  readonly column: string;
  /** Null: the order of the sale number, which the wide table has by itself. */
  readonly index: string | null;
}

function sortKeyOf(by: string, classId: number, attributes: readonly StoredAttribute[]): SortKey {
  if (by === "id") return { table: "v", column: "v.sale_id", index: null };
  const builtIn = Object.hasOwn(BUILT_IN_SORTS, by) ? BUILT_IN_SORTS[by]! : null;
  if (builtIn !== null) return { table: "s", ...builtIn };
  const { column } = attributes.find(({ attribute }) => attribute.key === by) ?? noSuchKey(by);
  return { table: "v", column: `v.${column}`, index: valuesIndex(classId, column) };
}

export interface RegisterSql {
  readonly sql: string;
  readonly params: readonly Param[];
}

function whereOf(conditions: readonly Condition[], classId: number, usesSales: boolean): RegisterSql {
  const all = usesSales ? [onSale("s.class_id = ?", classId), ...conditions] : conditions;
  const sql = all.length === 0 ? "" : ` WHERE ${all.map((each) => each.sql).join(" AND ")}`;
  return { sql, params: all.flatMap((each) => each.params) };
}

/** SELECT of the number of hits. */
export function countSql(filter: RegisterFilter, classId: number, attributes: readonly StoredAttribute[]): RegisterSql {
  const conditions = conditionsOf(filter, attributes);
  const usesSales = conditions.some(({ tables }) => tables !== "v");
  const usesValues = conditions.some(({ tables }) => tables !== "s") || !usesSales;
  const values = `${valuesTable(classId)} v`;
  const from = usesSales ? (usesValues ? `sales s JOIN ${values} ON v.sale_id = s.id` : "sales s") : values;
  const where = whereOf(conditions, classId, usesSales);
  return { sql: `SELECT count(*) FROM ${from}${where.sql}`, params: where.params };
}

/** SELECT of one page of sale numbers, for a filter with `total` hits. Not known comes last, whichever way it is sorted. */
export function pageSql(query: RegisterQuery, attributes: readonly StoredAttribute[], total: number): RegisterSql {
  const conditions = conditionsOf(query.filter, attributes);
  const key = sortKeyOf(query.sort.by, query.classId, attributes);
  const usesSales = key.table === "s" || conditions.some(({ tables }) => tables !== "v");
  const usesValues = key.table === "v" || conditions.some(({ tables }) => tables !== "s");
  const walks = total > FEW || conditions.length === 0;
  const hint = walks ? (key.index === null ? " NOT INDEXED" : ` INDEXED BY ${key.index}`) : "";
  const join = walks ? "CROSS JOIN" : "JOIN";
  const sales = `sales s${key.table === "s" ? hint : ""}`;
  const values = `${valuesTable(query.classId)} v${key.table === "v" ? hint : ""}`;
  const [first, second] = key.table === "s" ? [sales, usesValues ? values : ""] : [values, usesSales ? sales : ""];
  const from = second === "" ? first : `${first} ${join} ${second} ON v.sale_id = s.id`;
  const id = key.table === "s" ? "s.id" : "v.sale_id";
  const direction = query.sort.descending ? "DESC" : "ASC";
  // Unary plus keeps the few hits from being looked up along the sort key's index.
  const column = walks ? key.column : `+${key.column}`;
  const order = query.sort.by === "id" ? `${id} ${direction}` : `${column} ${direction} NULLS LAST, ${id} ${direction}`;
  const where = whereOf(conditions, query.classId, usesSales);
  return {
    sql: `SELECT ${id} FROM ${from}${where.sql} ORDER BY ${order} LIMIT ? OFFSET ?`,
    params: [...where.params, query.limit, query.offset],
  };
}

/** Reads pages and remembers the number of hits until the class's sales change. */
export function registerOf(db: Database) {
  const totals = new Map<string, number>();

  function totalOf(query: RegisterQuery, attributes: readonly StoredAttribute[], dataVersion: number): number {
    const key = JSON.stringify([query.classId, dataVersion, query.filter]);
    const known = totals.get(key);
    if (known !== undefined) return known;
    const { sql, params } = countSql(query.filter, query.classId, attributes);
    const total = db
      .prepare<Param[], number>(sql)
      .pluck()
      .get(...params)!;
    if (totals.size >= 100) totals.clear();
    totals.set(key, total);
    return total;
  }

  return (query: RegisterQuery, attributes: readonly StoredAttribute[], dataVersion: number) => {
    const total = totalOf(query, attributes, dataVersion);
    const { sql, params } = pageSql(query, attributes, total);
    const ids =
      total === 0
        ? []
        : db
            .prepare<Param[], number>(sql)
            .pluck()
            .all(...params);
    return { total, ids };
  };
}
