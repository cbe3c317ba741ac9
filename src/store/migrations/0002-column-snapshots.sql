-- Sales of a class as columns, a copy that is quicker to read than rows; everything in it can be made again from the rows.
-- A copy counts only while its stamp stands and names the class's rows_version: the stamp is taken away by triggers on the rows
-- themselves (on sales here, on each class's wide table by store/columnSnapshot.ts), whoever writes them.
CREATE TABLE column_snapshots (
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  name TEXT NOT NULL,
  block INTEGER NOT NULL,
  bytes BLOB NOT NULL,
  UNIQUE (class_id, name, block)
) STRICT;

CREATE TABLE snapshot_stamps (
  class_id INTEGER PRIMARY KEY REFERENCES asset_classes (id),
  rows_version INTEGER NOT NULL,
  sale_count INTEGER NOT NULL
) STRICT;

CREATE TRIGGER snapshot_ends_with_new_sales AFTER INSERT ON sales
BEGIN DELETE FROM snapshot_stamps WHERE class_id = NEW.class_id; END;
CREATE TRIGGER snapshot_ends_with_changed_sales
AFTER UPDATE OF id, class_id, sold_on, price_minor, currency_code, price_basis, channel, source_id ON sales
BEGIN DELETE FROM snapshot_stamps WHERE class_id IN (OLD.class_id, NEW.class_id); END;
CREATE TRIGGER snapshot_ends_with_removed_sales AFTER DELETE ON sales
BEGIN DELETE FROM snapshot_stamps WHERE class_id = OLD.class_id; END;
