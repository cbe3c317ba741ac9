-- The store's tables. Days are day numbers (whole days since 1970-01-01), money is in minor units, instants are UTC text.
-- Attribute values live in one wide table per asset class, sale_values_<class id>, made by attributeTables.ts when the
-- class is made; the catalogue of its columns is the table attributes.

CREATE TABLE asset_classes (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  name TEXT NOT NULL COLLATE NOCASE UNIQUE CHECK (name <> ''),
  item_word TEXT NOT NULL,
  currency_code TEXT NOT NULL CHECK (length(currency_code) = 3),
  premium TEXT NOT NULL CHECK (premium IN ('in', 'out', 'none')),
  tax TEXT NOT NULL CHECK (tax IN ('in', 'out')),
  invented INTEGER NOT NULL CHECK (invented IN (0, 1)),
  -- data_version rises with every change; rows_version only when sales come or go or an attribute changes.
  data_version INTEGER NOT NULL DEFAULT 1,
  rows_version INTEGER NOT NULL DEFAULT 1
) STRICT;

CREATE TABLE attributes (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  position INTEGER NOT NULL,
  key TEXT NOT NULL,
  column_name TEXT NOT NULL,
  label TEXT NOT NULL,
  kind TEXT NOT NULL CHECK (kind IN ('number', 'choice', 'yesNo', 'built')),
  unit TEXT,
  step REAL NOT NULL CHECK (step > 0),
  lowest REAL,
  highest REAL,
  expected_direction TEXT CHECK (expected_direction IN ('up', 'down')),
  notes TEXT NOT NULL,
  decimals INTEGER NOT NULL,
  archived INTEGER NOT NULL CHECK (archived IN (0, 1)),
  UNIQUE (class_id, key),
  UNIQUE (class_id, column_name)
) STRICT;

-- Levels of a choice; the code is the place in the stated order and is what the wide table holds.
CREATE TABLE attribute_levels (
  attribute_id INTEGER NOT NULL REFERENCES attributes (id),
  code INTEGER NOT NULL CHECK (code >= 0),
  name TEXT NOT NULL,
  PRIMARY KEY (attribute_id, code),
  UNIQUE (attribute_id, name)
) STRICT, WITHOUT ROWID;

CREATE TABLE sources (
  id INTEGER PRIMARY KEY,
  name TEXT NOT NULL UNIQUE
) STRICT;

CREATE TABLE import_batches (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  file_name TEXT NOT NULL,
  file_digest TEXT NOT NULL,
  imported_at_utc TEXT NOT NULL,
  imported_by TEXT NOT NULL,
  options_json TEXT NOT NULL CHECK (json_valid(options_json)),
  match_json TEXT NOT NULL CHECK (json_valid(match_json)),
  headings_json TEXT NOT NULL CHECK (json_valid(headings_json)),
  rows_read INTEGER NOT NULL,
  accepted INTEGER NOT NULL CHECK (accepted >= 0),
  held_back INTEGER NOT NULL CHECK (held_back >= 0),
  duplicates INTEGER NOT NULL CHECK (duplicates >= 0),
  blank_rows INTEGER NOT NULL,
  undone INTEGER NOT NULL DEFAULT 0 CHECK (undone IN (0, 1)),
  CHECK (rows_read = accepted + held_back + duplicates)
) STRICT;
CREATE INDEX import_batches_by_class ON import_batches (class_id);

-- channel: 0 auction, 1 dealer, 2 private, 3 asking. price_basis: 2 × premium (0 in, 1 out, 2 none) + tax (0 in, 1 out).
CREATE TABLE sales (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  sold_on INTEGER NOT NULL,
  price_minor INTEGER NOT NULL CHECK (price_minor > 0),
  currency_code TEXT NOT NULL CHECK (length(currency_code) = 3),
  price_basis INTEGER NOT NULL CHECK (price_basis BETWEEN 0 AND 5),
  channel INTEGER NOT NULL CHECK (channel BETWEEN 0 AND 3),
  source_id INTEGER NOT NULL REFERENCES sources (id),
  title TEXT NOT NULL,
  reference TEXT,
  notes TEXT NOT NULL,
  batch_id INTEGER REFERENCES import_batches (id),
  file_row INTEGER,
  verified_on INTEGER,
  verified_by TEXT,
  verified_how TEXT,
  set_aside_on INTEGER,
  set_aside_by TEXT,
  set_aside_reason TEXT,
  CHECK ((verified_on IS NULL) = (verified_by IS NULL) AND (verified_on IS NULL) = (verified_how IS NULL)),
  CHECK ((set_aside_on IS NULL) = (set_aside_by IS NULL) AND (set_aside_on IS NULL) = (set_aside_reason IS NULL))
) STRICT;
-- Carries what the register filters by most, so that counting the hits needs no look into the rows.
CREATE INDEX sales_by_sold_on ON sales (class_id, sold_on, id, channel, set_aside_on, verified_on);
CREATE INDEX sales_by_price ON sales (class_id, price_minor);
CREATE INDEX sales_by_title ON sales (class_id, title COLLATE NOCASE);
CREATE INDEX sales_by_reference ON sales (class_id, reference COLLATE NOCASE);
CREATE INDEX sales_by_channel ON sales (class_id, channel);
CREATE INDEX sales_by_verified ON sales (class_id, verified_on);
CREATE INDEX sales_by_set_aside ON sales (class_id, set_aside_on);
CREATE INDEX sales_by_batch ON sales (batch_id);

-- Verbatim cells of the row a sale came from, in the order of its batch's headings. Kept when the sale is removed.
CREATE TABLE sale_cells (
  sale_id INTEGER PRIMARY KEY,
  cells_json TEXT NOT NULL
) STRICT;

-- Sales of undone batches, whole as JSON: out of the register, still there for whoever asks about an old edition.
CREATE TABLE removed_sales (
  id INTEGER PRIMARY KEY,
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  batch_id INTEGER REFERENCES import_batches (id),
  removed_at_utc TEXT NOT NULL,
  sale_json TEXT NOT NULL CHECK (json_valid(sale_json))
) STRICT;
CREATE INDEX removed_sales_by_class ON removed_sales (class_id);

CREATE TABLE held_back_rows (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  batch_id INTEGER NOT NULL REFERENCES import_batches (id),
  file_row INTEGER NOT NULL,
  cells_json TEXT NOT NULL CHECK (json_valid(cells_json)),
  reasons_json TEXT NOT NULL CHECK (json_valid(reasons_json)),
  state TEXT NOT NULL DEFAULT 'open' CHECK (state IN ('open', 'mended', 'leftOut', 'undone')),
  left_out_reason TEXT,
  sale_id INTEGER,
  CHECK ((state = 'leftOut') = (left_out_reason IS NOT NULL)),
  UNIQUE (batch_id, file_row)
) STRICT;

CREATE TABLE duplicate_rows (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  batch_id INTEGER NOT NULL REFERENCES import_batches (id),
  file_row INTEGER NOT NULL,
  same_as_json TEXT NOT NULL CHECK (json_valid(same_as_json)),
  why TEXT NOT NULL,
  cells_json TEXT NOT NULL CHECK (json_valid(cells_json)),
  UNIQUE (batch_id, file_row)
) STRICT;

-- The column match last used for files with these headings.
CREATE TABLE column_matches (
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  headings_json TEXT NOT NULL,
  match_json TEXT NOT NULL CHECK (json_valid(match_json)),
  used_at_utc TEXT NOT NULL,
  PRIMARY KEY (class_id, headings_json)
) STRICT, WITHOUT ROWID;

CREATE TABLE editions (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  number INTEGER NOT NULL,
  saved_at_utc TEXT NOT NULL,
  saved_by TEXT NOT NULL,
  model_json TEXT NOT NULL CHECK (json_valid(model_json)),
  evidence_fingerprint TEXT NOT NULL,
  sale_count INTEGER NOT NULL,
  sale_ids BLOB NOT NULL,
  summary_json TEXT NOT NULL CHECK (json_valid(summary_json)),
  report_json TEXT NOT NULL CHECK (json_valid(report_json)),
  UNIQUE (class_id, number)
) STRICT;
CREATE TRIGGER editions_are_not_changed BEFORE UPDATE ON editions
BEGIN SELECT RAISE(ABORT, 'an edition is never changed'); END;
CREATE TRIGGER editions_are_not_deleted BEFORE DELETE ON editions
BEGIN SELECT RAISE(ABORT, 'an edition is never deleted'); END;
CREATE TRIGGER editions_are_not_replaced BEFORE INSERT ON editions
WHEN EXISTS (SELECT 1 FROM editions WHERE id = NEW.id OR (class_id = NEW.class_id AND number = NEW.number))
BEGIN SELECT RAISE(ABORT, 'an edition is never replaced'); END;

CREATE TABLE drafts (
  class_id INTEGER PRIMARY KEY REFERENCES asset_classes (id),
  subject_json TEXT NOT NULL CHECK (json_valid(subject_json)),
  engagement_json TEXT CHECK (json_valid(engagement_json)),
  saved_at_utc TEXT NOT NULL
) STRICT;

CREATE TABLE sheets (
  id INTEGER PRIMARY KEY AUTOINCREMENT,
  class_id INTEGER NOT NULL REFERENCES asset_classes (id),
  edition_id INTEGER NOT NULL REFERENCES editions (id),
  number TEXT NOT NULL UNIQUE,
  state TEXT NOT NULL CHECK (state IN ('issued', 'withdrawn', 'superseded')),
  state_reason TEXT,
  title TEXT NOT NULL,
  amount REAL NOT NULL,
  low REAL NOT NULL,
  high REAL NOT NULL,
  currency_code TEXT NOT NULL CHECK (length(currency_code) = 3),
  effective_on TEXT NOT NULL,
  issued_at_utc TEXT NOT NULL,
  issued_by TEXT NOT NULL,
  digest TEXT NOT NULL UNIQUE,
  bytes BLOB NOT NULL
) STRICT;
CREATE INDEX sheets_by_class ON sheets (class_id);
-- A sheet may be withdrawn or superseded, once, with a reason; nothing else of it ever changes.
CREATE TRIGGER sheets_are_not_changed BEFORE UPDATE ON sheets
WHEN OLD.state <> 'issued' OR NEW.state = 'issued' OR NEW.state_reason IS NULL
  OR NEW.id IS NOT OLD.id OR NEW.class_id IS NOT OLD.class_id OR NEW.edition_id IS NOT OLD.edition_id
  OR NEW.number IS NOT OLD.number OR NEW.title IS NOT OLD.title OR NEW.amount IS NOT OLD.amount
  OR NEW.low IS NOT OLD.low OR NEW.high IS NOT OLD.high OR NEW.currency_code IS NOT OLD.currency_code
  OR NEW.effective_on IS NOT OLD.effective_on OR NEW.issued_at_utc IS NOT OLD.issued_at_utc
  OR NEW.issued_by IS NOT OLD.issued_by OR NEW.digest IS NOT OLD.digest OR NEW.bytes IS NOT OLD.bytes
BEGIN SELECT RAISE(ABORT, 'a sheet is never changed'); END;
CREATE TRIGGER sheets_are_not_deleted BEFORE DELETE ON sheets
BEGIN SELECT RAISE(ABORT, 'a sheet is never deleted'); END;
CREATE TRIGGER sheets_are_not_replaced BEFORE INSERT ON sheets
WHEN EXISTS (SELECT 1 FROM sheets WHERE id = NEW.id OR number = NEW.number OR digest = NEW.digest)
BEGIN SELECT RAISE(ABORT, 'a sheet is never replaced'); END;

-- No foreign key to classes: an entry stands for itself.
CREATE TABLE journal (
  id INTEGER PRIMARY KEY,
  at_utc TEXT NOT NULL,
  by_whom TEXT NOT NULL,
  act TEXT NOT NULL,
  class_id INTEGER,
  sentence TEXT NOT NULL,
  facts_json TEXT NOT NULL CHECK (json_valid(facts_json)),
  previous_digest TEXT NOT NULL,
  digest TEXT NOT NULL UNIQUE
) STRICT;
CREATE TRIGGER journal_is_not_changed BEFORE UPDATE ON journal
BEGIN SELECT RAISE(ABORT, 'the journal is never changed'); END;
CREATE TRIGGER journal_is_not_deleted BEFORE DELETE ON journal
BEGIN SELECT RAISE(ABORT, 'the journal is never shortened'); END;
CREATE TRIGGER journal_is_only_appended BEFORE INSERT ON journal
WHEN NEW.id <> (SELECT coalesce(max(id), 0) + 1 FROM journal)
BEGIN SELECT RAISE(ABORT, 'the journal is only ever appended to'); END;

CREATE TABLE settings (
  name TEXT PRIMARY KEY,
  value TEXT NOT NULL
) STRICT, WITHOUT ROWID;
