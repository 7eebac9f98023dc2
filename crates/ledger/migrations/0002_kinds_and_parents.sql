-- Schema 2: one table of revisions that can stand alone.
--
-- A revision carries its kind, so that it can be read where the rest of a damaged file cannot, and so that kinds still to
-- come (instruments, photos) need no new table. A parent need not be here: it may be lost, or come with a later merge.

DROP VIEW head;

-- Identities are hyphenated lower-case hexadecimal: a flipped bit in one is found when the file is opened. (A CHECK lets
-- NULL pass.)
CREATE TABLE revision_2 (
    id TEXT NOT NULL PRIMARY KEY CHECK (length(id) = 36 AND length(replace(id, '-', '')) = 32 AND id NOT GLOB '*[^-0-9a-f]*'),
    record TEXT NOT NULL CHECK (length(record) = 36 AND length(replace(record, '-', '')) = 32 AND record NOT GLOB '*[^-0-9a-f]*'),
    kind TEXT NOT NULL CHECK (length(kind) BETWEEN 1 AND 40),
    parent TEXT CHECK (parent <> id AND length(parent) = 36 AND length(replace(parent, '-', '')) = 32 AND parent NOT GLOB '*[^-0-9a-f]*'),
    device TEXT NOT NULL CHECK (length(device) = 36 AND length(replace(device, '-', '')) = 32 AND device NOT GLOB '*[^-0-9a-f]*'),
    at_ms INTEGER NOT NULL CHECK (at_ms >= 0),
    utc_offset_min INTEGER NOT NULL CHECK (utc_offset_min BETWEEN -900 AND 900),
    withdrawn INTEGER NOT NULL CHECK (withdrawn IN (0, 1)),
    invented INTEGER NOT NULL CHECK (invented IN (0, 1)),
    site TEXT CHECK (length(site) = 36 AND length(replace(site, '-', '')) = 32 AND site NOT GLOB '*[^-0-9a-f]*'),
    equipment TEXT CHECK (length(equipment) = 36 AND length(replace(equipment, '-', '')) = 32 AND equipment NOT GLOB '*[^-0-9a-f]*'),
    visit TEXT CHECK (length(visit) = 36 AND length(replace(visit, '-', '')) = 32 AND visit NOT GLOB '*[^-0-9a-f]*'),
    title TEXT NOT NULL CHECK (length(title) <= 400),
    app_version TEXT NOT NULL,
    body TEXT NOT NULL
) STRICT;
INSERT INTO revision_2
    SELECT revision.id, record, kind, parent, device, at_ms, utc_offset_min, withdrawn, invented, site, equipment, visit,
        title, app_version, body
    FROM revision JOIN record ON record.id = revision.record ORDER BY revision.id;
DROP TABLE revision;
DROP TABLE record;
ALTER TABLE revision_2 RENAME TO revision;

CREATE INDEX revision_by_record ON revision (record);
CREATE INDEX revision_by_parent ON revision (parent);
-- Entries of a visit, of a piece of equipment, of a site are listed on every screen that shows one.
CREATE INDEX revision_by_visit ON revision (visit);
CREATE INDEX revision_by_equipment ON revision (equipment);
CREATE INDEX revision_by_site ON revision (site);
-- The newest few of a kind are found without sorting them all.
CREATE INDEX revision_by_kind ON revision (kind, record);

CREATE TRIGGER revision_no_update BEFORE UPDATE ON revision BEGIN SELECT RAISE(ABORT, 'revisions are append-only'); END;
CREATE TRIGGER revision_no_delete BEFORE DELETE ON revision BEGIN SELECT RAISE(ABORT, 'revisions are append-only'); END;
CREATE TRIGGER revision_of_one_kind BEFORE INSERT ON revision
    WHEN EXISTS (SELECT 1 FROM revision WHERE record = NEW.record AND kind <> NEW.kind)
    BEGIN SELECT RAISE(ABORT, 'a record is of one kind'); END;
CREATE TRIGGER revision_of_one_record BEFORE INSERT ON revision
    WHEN EXISTS (SELECT 1 FROM revision WHERE id = NEW.parent AND record <> NEW.record)
        OR EXISTS (SELECT 1 FROM revision WHERE parent = NEW.id AND record <> NEW.record)
    BEGIN SELECT RAISE(ABORT, 'a revision replaces one of the same record'); END;
-- SQLite stores NaN as NULL, which the column refuses; infinity it would store.
CREATE TRIGGER result_is_finite BEFORE INSERT ON result
    WHEN abs(NEW.si) > 1.7976931348623157e308 OR abs(NEW.half_width_si) > 1.7976931348623157e308
    BEGIN SELECT RAISE(ABORT, 'a result is a finite number'); END;

-- The revisions that no other replaces: what stands now. More than one of a record are corrections made apart.
CREATE VIEW head AS
    SELECT * FROM revision
    WHERE NOT EXISTS (SELECT 1 FROM revision AS later WHERE later.parent = revision.id);
