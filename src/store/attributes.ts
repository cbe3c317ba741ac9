/** The catalogue of attributes: what each class records of an item, and which generated column holds it. */
import type { Database } from "better-sqlite3";
import type { Attribute, AttributeKind } from "../domain/attribute.ts";
import { AppError } from "../domain/errors.ts";
import { addValuesColumn, type StoredAttribute, valuesTable } from "./attributeTables.ts";

interface AttributeRow {
  id: number;
  key: string;
  column_name: string;
  label: string;
  kind: AttributeKind;
  unit: string | null;
  step: number;
  lowest: number | null;
  highest: number | null;
  expected_direction: "up" | "down" | null;
  notes: string;
  decimals: number;
  archived: number;
}

function rowToAttribute(row: AttributeRow, levels: readonly string[]): StoredAttribute {
  return {
    id: row.id,
    column: row.column_name,
    attribute: {
      key: row.key,
      label: row.label,
      kind: row.kind,
      unit: row.unit,
      step: row.step,
      levels,
      lowest: row.lowest,
      highest: row.highest,
      expectedDirection: row.expected_direction,
      notes: row.notes,
      decimals: row.decimals,
      archived: row.archived === 1,
    },
  };
}

function refuse(code: string, what: string, where: string, whatToDo: string): never {
  throw new AppError({ family: "store", code, what, where, whatToDo });
}

function refuseRepeatedLevels(attribute: Attribute): void {
  const repeated = attribute.levels.find((level, at) => attribute.levels.indexOf(level) !== at);
  if (repeated === undefined) return;
  refuse(
    "repeated-level",
    `"${repeated}" stands twice in the list of ${attribute.label}.`,
    attribute.label,
    "Name each level once.",
  );
}

export type Attributes = ReturnType<typeof attributesOf>;

export function attributesOf(db: Database) {
  const selectAll = db.prepare<[number], AttributeRow>(
    `SELECT id, key, column_name, label, kind, unit, step, lowest, highest, expected_direction, notes, decimals, archived
     FROM attributes WHERE class_id = ? ORDER BY position`,
  );
  const selectLevels = db
    .prepare<[number], string>("SELECT name FROM attribute_levels WHERE attribute_id = ? ORDER BY code")
    .pluck();
  const insertRow = db.prepare(
    `INSERT INTO attributes (class_id, position, key, column_name, label, kind, unit, step, lowest, highest,
       expected_direction, notes, decimals, archived)
     VALUES (@classId, @position, @key, @column, @label, @kind, @unit, @step, @lowest, @highest,
       @expectedDirection, @notes, @decimals, @archived)`,
  );
  const updateRow = db.prepare(
    `UPDATE attributes SET label = @label, unit = @unit, step = @step, lowest = @lowest, highest = @highest,
       expected_direction = @expectedDirection, notes = @notes, decimals = @decimals, archived = @archived WHERE id = @id`,
  );
  const insertLevel = db.prepare("INSERT INTO attribute_levels (attribute_id, code, name) VALUES (?, ?, ?)");
  const deleteLevels = db.prepare("DELETE FROM attribute_levels WHERE attribute_id = ?");
  const raiseVersion = db.prepare(
    "UPDATE asset_classes SET data_version = data_version + 1, rows_version = rows_version + 1 WHERE id = ?",
  );

  /** Attributes of a class with their columns, in their stated order. */
  function listStored(classId: number): StoredAttribute[] {
    return selectAll
      .all(classId)
      .map((row) => rowToAttribute(row, row.kind === "choice" ? selectLevels.all(row.id) : []));
  }

  function find(classId: number, key: string): StoredAttribute {
    const found = listStored(classId).find((each) => each.attribute.key === key);
    return (
      found ??
      refuse(
        "no-such-attribute",
        `There is no attribute "${key}" in this class.`,
        key,
        "Choose one of the class's attributes.",
      )
    );
  }

  function writeLevels(attributeId: number, levels: readonly string[]): void {
    deleteLevels.run(attributeId);
    for (const [code, name] of levels.entries()) insertLevel.run(attributeId, code, name);
  }

  /** Adds an attribute with its column and index. Refuses (AppError) a key or label that the class has already. */
  function insert(classId: number, attribute: Attribute): void {
    const stored = listStored(classId);
    const label = attribute.label.trim().toLowerCase();
    if (
      stored.some((each) => each.attribute.key === attribute.key || each.attribute.label.trim().toLowerCase() === label)
    ) {
      refuse(
        "attribute-exists",
        `This class has an attribute "${attribute.label}" already.`,
        attribute.label,
        "Give another name, or use the one that is there.",
      );
    }
    refuseRepeatedLevels(attribute);
    const column = `v${stored.length + 1}`;
    const { levels, ...plain } = attribute;
    const id = insertRow.run({
      ...plain,
      classId,
      position: stored.length,
      column,
      archived: attribute.archived ? 1 : 0,
    }).lastInsertRowid as number;
    writeLevels(id, levels);
    addValuesColumn(db, classId, column, attribute.kind);
    raiseVersion.run(classId);
  }

  /** Levels are codes by place: a new order rewrites the column, a level that sales still have can't go. */
  function moveLevels(classId: number, stored: StoredAttribute, levels: readonly string[]): void {
    const before = stored.attribute.levels;
    const table = valuesTable(classId);
    const count = db.prepare<[number], number>(`SELECT count(*) FROM ${table} WHERE ${stored.column} = ?`).pluck();
    for (const [code, level] of before.entries()) {
      const having = levels.includes(level) ? 0 : count.get(code)!;
      if (having === 0) continue;
      refuse(
        "level-in-use",
        `${having} sales have "${level}" as ${stored.attribute.label}, so it can't leave the list.`,
        stored.attribute.label,
        "Keep the level, or change those sales first.",
      );
    }
    const moved = before
      .map((level, code) => ({ from: code, to: levels.indexOf(level) }))
      .filter(({ from, to }) => to >= 0 && to !== from);
    if (moved.length > 0) {
      const cases = moved.map(({ from, to }) => `WHEN ${from} THEN ${to}`).join(" ");
      const codes = moved.map(({ from }) => from).join(", ");
      db.exec(
        `UPDATE ${table} SET ${stored.column} = CASE ${stored.column} ${cases} END WHERE ${stored.column} IN (${codes})`,
      );
    }
    writeLevels(stored.id, levels);
  }

  /**
   * Changes everything but key and kind. Refuses (AppError) another kind, another key, a label of another attribute, and
   * taking away a level that sales have.
   */
  function change(classId: number, key: string, attribute: Attribute): void {
    const stored = find(classId, key);
    if (attribute.key !== key || attribute.kind !== stored.attribute.kind) {
      refuse(
        "fixed-kind",
        `The kind of ${stored.attribute.label} can't be changed once it is made.`,
        stored.attribute.label,
        "Archive it and add a new attribute of the other kind.",
      );
    }
    const label = attribute.label.trim().toLowerCase();
    if (
      listStored(classId).some((each) => each.id !== stored.id && each.attribute.label.trim().toLowerCase() === label)
    ) {
      refuse(
        "attribute-exists",
        `This class has an attribute "${attribute.label}" already.`,
        attribute.label,
        "Give another name.",
      );
    }
    refuseRepeatedLevels(attribute);
    if (JSON.stringify(attribute.levels) !== JSON.stringify(stored.attribute.levels))
      moveLevels(classId, stored, attribute.levels);
    const { levels, key: _key, kind: _kind, ...plain } = attribute;
    updateRow.run({ ...plain, archived: attribute.archived ? 1 : 0, id: stored.id });
    raiseVersion.run(classId);
  }

  return {
    listStored,
    list: (classId: number): Attribute[] => listStored(classId).map(({ attribute }) => attribute),
    insert,
    change,
    /** Out of sight and out of new models; every value stays. */
    archive(classId: number, key: string, archived: boolean): void {
      change(classId, key, { ...find(classId, key).attribute, archived });
    },
    /** Puts levels that are not in the list yet at its end. */
    addLevels(classId: number, key: string, levels: readonly string[]): void {
      const { attribute } = find(classId, key);
      const fresh = [...new Set(levels)].filter((level) => !attribute.levels.includes(level));
      if (fresh.length > 0) change(classId, key, { ...attribute, levels: [...attribute.levels, ...fresh] });
    },
  };
}
