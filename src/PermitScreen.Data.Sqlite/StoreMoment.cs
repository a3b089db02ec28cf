namespace PermitScreen.Data.Sqlite;

/// <summary>Moments at which a process may end.</summary>
public enum StoreMoment
{
    /// <summary>Inside the transaction of a migration, after one of its statements.</summary>
    InMigration,

    /// <summary>Everything of a change is written, and not yet committed.</summary>
    InsideTransaction,

    /// <summary>The change is committed, and the caller does not know it yet.</summary>
    AfterCommit,

    /// <summary>Lines are written, and not yet committed.</summary>
    LinesInsideTransaction,

    /// <summary>Lines are committed.</summary>
    LinesAfterCommit,

    /// <summary>Lines are kept, and still stand on the backlog.</summary>
    BeforeStrike,

    /// <summary>In the middle of writing a backup.</summary>
    InBackup,

    /// <summary>What is to be replaced is kept, and the restored records are made ready beside it.</summary>
    BeforeRestore,

    /// <summary>In the middle of replacing the records.</summary>
    InRestore,

    /// <summary>The records are replaced, and the caller does not know it yet.</summary>
    AfterRestore,
}
