"""The tables of the journal in SQLite, and the triggers that guard them.

Only column types that PostgreSQL has in like form are used. The triggers stop accidents and
honest mistakes; who takes them away can write anything, and then the chain shows it.
"""

from __future__ import annotations

TABLES = (
    """
    CREATE TABLE entry (
        chain       TEXT    NOT NULL,
        seq         BIGINT  NOT NULL CHECK (seq >= 1),
        previous    BLOB    NOT NULL,
        deed        TEXT    NOT NULL,
        deed_index  BIGINT  NOT NULL CHECK (deed_index >= 1),
        kind        TEXT    NOT NULL,
        header      BLOB    NOT NULL,
        body        BLOB,
        signature   BLOB,
        PRIMARY KEY (chain, seq),
        UNIQUE (chain, previous),
        UNIQUE (deed, deed_index)
    )
    """,
    """
    CREATE TABLE sheet (
        digest      TEXT    NOT NULL PRIMARY KEY,
        data        BLOB    NOT NULL
    )
    """,
)

# INSERT OR REPLACE deletes the row it collides with. Delete triggers see that only with
# recursive_triggers on, a setting of each connection, so the insert is guarded as well. RAISE
# (ABORT) undoes the statement and leaves the savepoints of the transaction alone.
GUARDS: dict[str, str] = {
    "entry_is_never_changed": """
    CREATE TRIGGER entry_is_never_changed BEFORE UPDATE ON entry
    BEGIN SELECT RAISE(ABORT, 'an entry of the journal is never changed'); END
    """,
    "entry_is_never_deleted": """
    CREATE TRIGGER entry_is_never_deleted BEFORE DELETE ON entry
    BEGIN SELECT RAISE(ABORT, 'an entry of the journal is never deleted'); END
    """,
    "entry_is_never_replaced": """
    CREATE TRIGGER entry_is_never_replaced BEFORE INSERT ON entry
    WHEN EXISTS (SELECT 1 FROM entry WHERE rowid = NEW.rowid)
      OR EXISTS (SELECT 1 FROM entry WHERE chain = NEW.chain AND seq = NEW.seq)
      OR EXISTS (SELECT 1 FROM entry WHERE chain = NEW.chain AND previous = NEW.previous)
      OR EXISTS (SELECT 1 FROM entry WHERE deed = NEW.deed AND deed_index = NEW.deed_index)
    BEGIN SELECT RAISE(ABORT, 'an entry of the journal is never replaced'); END
    """,
    "sheet_is_never_changed": """
    CREATE TRIGGER sheet_is_never_changed BEFORE UPDATE ON sheet
    BEGIN SELECT RAISE(ABORT, 'an identity sheet is never changed, only erased'); END
    """,
}
"""The triggers by name."""


def plain(statement: str) -> str:
    """A statement with its white space levelled, to compare what is there with what should be."""
    return " ".join(statement.split())
