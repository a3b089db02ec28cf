"""Reads the files of a folder of records from outside, with Python's own SQLite. For a folder that a process may still use, on a copy."""

import shutil
import sqlite3
import tempfile
from contextlib import closing
from pathlib import Path

CATALOGUE = "catalogue.db"
LINES = "lines.db"
SEGMENT = "catalogue.segment"


def rows(file, query, *values):
    with closing(sqlite3.connect(f"file:{file}?mode=ro", uri=True)) as database:
        return database.execute(query, values).fetchall()


def change(file, statement, *values):
    """Writes behind the program's back."""
    with closing(sqlite3.connect(file)) as database:
        changed = database.execute(statement, values).rowcount
        database.commit()
        return changed


def lines(folder):
    """Every kept blob by its key."""
    return dict(rows(Path(folder) / LINES, "SELECT key, blob FROM lines"))


def revisions(folder):
    """Every revision but its instant: kind, name, from, to, content, actor, reason."""
    return rows(Path(folder) / CATALOGUE, "SELECT kind, name, from_version, to_version, hex(content), actor, reason FROM revisions ORDER BY kind, name, from_version")


def content(file):
    """All that a database says: schema, marks and every row; None where it cannot be read."""
    try:
        tables = [name for name, in rows(file, "SELECT name FROM sqlite_schema WHERE type = 'table' ORDER BY name")]
        marks = [rows(file, f"PRAGMA {mark}") for mark in ("user_version", "application_id")]
        return rows(file, "SELECT * FROM sqlite_schema ORDER BY name"), marks, [(table, rows(file, f'SELECT * FROM "{table}" ORDER BY 1, 2')) for table in tables]
    except (sqlite3.Error, UnicodeDecodeError):
        return None


def left_behind(folder):
    """What a killed process left: trusses on the backlog and the newest version; both 0 where there is no schema yet."""
    with tempfile.TemporaryDirectory() as copies:
        for path in Path(folder).glob(f"{CATALOGUE}*"):
            if not path.name.endswith("-shm"):
                shutil.copy(path, copies)
        file = Path(copies) / CATALOGUE
        if not file.exists():
            return 0, 0
        with closing(sqlite3.connect(file)) as database:
            if database.execute("SELECT count(*) FROM sqlite_schema").fetchone()[0] == 0:
                return 0, 0
            pending = database.execute("SELECT count(*) FROM backlog WHERE failure IS NULL").fetchone()[0]
            return pending, database.execute("SELECT version FROM version").fetchone()[0]
