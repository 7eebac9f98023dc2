-- Schema 1: records with append-only revisions, results for history, drafts, preferences.

CREATE TABLE identity (
    only_row INTEGER PRIMARY KEY CHECK (only_row = 1),
    device TEXT NOT NULL CHECK (length(device) = 36)
) STRICT;

CREATE TABLE record (
    id TEXT PRIMARY KEY CHECK (length(id) = 36),
    kind TEXT NOT NULL CHECK (kind IN ('site', 'equipment', 'visit', 'entry'))
) STRICT, WITHOUT ROWID;

-- One state of a record. A correction is a new revision that names the one it replaces. Two revisions that name the
-- same parent are two corrections made apart; both are kept. Order comes from parents, never from clocks.
CREATE TABLE revision (
    id TEXT PRIMARY KEY CHECK (length(id) = 36),
    record TEXT NOT NULL REFERENCES record (id),
    parent TEXT REFERENCES revision (id),
    device TEXT NOT NULL CHECK (length(device) = 36),
    at_ms INTEGER NOT NULL CHECK (at_ms >= 0),
    utc_offset_min INTEGER NOT NULL CHECK (utc_offset_min BETWEEN -900 AND 900),
    withdrawn INTEGER NOT NULL CHECK (withdrawn IN (0, 1)),
    invented INTEGER NOT NULL CHECK (invented IN (0, 1)),
    site TEXT CHECK (site IS NULL OR length(site) = 36),
    equipment TEXT CHECK (equipment IS NULL OR length(equipment) = 36),
    visit TEXT CHECK (visit IS NULL OR length(visit) = 36),
    title TEXT NOT NULL CHECK (length(title) <= 400),
    app_version TEXT NOT NULL,
    body TEXT NOT NULL
) STRICT, WITHOUT ROWID;
CREATE INDEX revision_by_record ON revision (record);
CREATE INDEX revision_by_parent ON revision (parent);
-- Entries of a visit, of a piece of equipment, of a site are listed on every screen that shows one.
CREATE INDEX revision_by_visit ON revision (visit);
CREATE INDEX revision_by_equipment ON revision (equipment);
CREATE INDEX revision_by_site ON revision (site);

CREATE TRIGGER record_no_update BEFORE UPDATE ON record BEGIN SELECT RAISE(ABORT, 'records are append-only'); END;
CREATE TRIGGER record_no_delete BEFORE DELETE ON record BEGIN SELECT RAISE(ABORT, 'records are append-only'); END;
CREATE TRIGGER revision_no_update BEFORE UPDATE ON revision BEGIN SELECT RAISE(ABORT, 'revisions are append-only'); END;
CREATE TRIGGER revision_no_delete BEFORE DELETE ON revision BEGIN SELECT RAISE(ABORT, 'revisions are append-only'); END;

-- Results of an entry's revision, in SI, for histories.
CREATE TABLE result (
    revision TEXT NOT NULL REFERENCES revision (id),
    key TEXT NOT NULL,
    quantity TEXT NOT NULL,
    si REAL NOT NULL,
    half_width_si REAL CHECK (half_width_si IS NULL OR half_width_si >= 0),
    PRIMARY KEY (revision, key)
) STRICT, WITHOUT ROWID;
CREATE TRIGGER result_no_update BEFORE UPDATE ON result BEGIN SELECT RAISE(ABORT, 'results are append-only'); END;
CREATE TRIGGER result_no_delete BEFORE DELETE ON result BEGIN SELECT RAISE(ABORT, 'results are append-only'); END;

-- The revisions that no other replaces: what stands now. More than one of a record are corrections made apart.
CREATE VIEW head AS
    SELECT revision.*, record.kind AS kind
    FROM revision JOIN record ON record.id = revision.record
    WHERE NOT EXISTS (SELECT 1 FROM revision AS later WHERE later.parent = revision.id);

CREATE TABLE draft (
    id TEXT PRIMARY KEY CHECK (length(id) = 36),
    kept_ms INTEGER NOT NULL,
    discarded_ms INTEGER,
    title TEXT NOT NULL,
    body TEXT NOT NULL
) STRICT, WITHOUT ROWID;

CREATE TABLE preference (
    key TEXT PRIMARY KEY,
    value TEXT NOT NULL
) STRICT, WITHOUT ROWID;
