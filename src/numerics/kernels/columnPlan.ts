/**
 * Which columns of a design are summed as numbers and which by groups of rows. Levels of one choice share their codes: from
 * three levels on the choice is summed by groups; fewer are cheaper as a column of zeros and ones inside the block.
 */
import { type Column, type Indicator, isIndicator } from "../column.ts";

const GROUPED_LEVELS = 3;

/** Column numbers in the order handed in. */
export interface ColumnPlan {
  readonly columns: readonly Column[];
  readonly numbers: readonly number[];
  readonly choices: readonly GroupedChoice[];
}

export interface GroupedChoice {
  readonly codes: Uint16Array;
  /** The group of a code: 0 for every level that no column stands for, and for codes beyond the end. */
  readonly groupOf: Uint16Array;
  /** Groups, with group 0. */
  readonly groups: number;
  readonly members: readonly { readonly column: number; readonly group: number }[];
}

export function planColumns(columns: readonly Column[]): ColumnPlan {
  const numbers: number[] = [];
  const levels: { readonly codes: Uint16Array; readonly at: number[] }[] = [];
  columns.forEach((column, j) => {
    if (!isIndicator(column)) numbers.push(j);
    else {
      const known = levels.find(({ codes }) => isSameMemory(codes, column.codes));
      if (known === undefined) levels.push({ codes: column.codes, at: [j] });
      else known.at.push(j);
    }
  });
  const grouped = levels.filter(({ at }) => at.length >= GROUPED_LEVELS);
  const few = levels.filter(({ at }) => at.length < GROUPED_LEVELS).flatMap(({ at }) => at);
  return {
    columns,
    numbers: [...numbers, ...few],
    choices: grouped.map(({ codes, at }) =>
      groupChoice(
        codes,
        at.map((j) => ({ column: j, level: (columns[j] as Indicator).level })),
      ),
    ),
  };
}

function isSameMemory(a: Uint16Array, b: Uint16Array): boolean {
  return a === b || (a.buffer === b.buffer && a.byteOffset === b.byteOffset && a.length === b.length);
}

function groupChoice(codes: Uint16Array, members: readonly { column: number; level: number }[]): GroupedChoice {
  const groupOf = new Uint16Array(Math.max(...members.map(({ level }) => level)) + 1);
  let groups = 1;
  const placed = members.map(({ column, level }) => {
    if (groupOf[level] === 0) groupOf[level] = groups++;
    return { column, group: groupOf[level]! };
  });
  return { codes, groupOf, groups, members: placed };
}
