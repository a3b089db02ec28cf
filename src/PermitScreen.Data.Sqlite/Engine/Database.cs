using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using SQLitePCL;

namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>One connection with its prepared statements. For one thread at a time.</summary>
internal sealed class Database : IDisposable
{
    private const int KeepLogOnClose = 1006; // SQLITE_DBCONFIG_NO_CKPT_ON_CLOSE

    private readonly Dictionary<string, SqliteCommand> _statements = new(StringComparer.Ordinal);
    private readonly SqliteConnection _connection;
    private readonly int _timeoutSeconds;

    private Database(string file, SqliteConnection connection, TimeSpan busyTimeout)
    {
        File = file;
        _connection = connection;
        _timeoutSeconds = Math.Max(1, (int)Math.Ceiling(busyTimeout.TotalSeconds));
    }

    /// <summary>File, for messages.</summary>
    public string File { get; }

    /// <summary>The connection itself, for backups.</summary>
    public sqlite3 Handle => _connection.Handle!;

    /// <summary>Opens a file.</summary>
    /// <param name="file">File.</param>
    /// <param name="mode">Whether it may be written or made.</param>
    /// <param name="busyTimeout">How long to wait for other connections.</param>
    /// <exception cref="StoreException">It cannot be opened.</exception>
    public static Database Open(string file, SqliteOpenMode mode, TimeSpan busyTimeout)
    {
        var text = new SqliteConnectionStringBuilder { DataSource = file, Mode = mode, Pooling = false }.ToString();
        var connection = new SqliteConnection(text);
        try
        {
            connection.Open();
            var database = new Database(file, connection, busyTimeout);
            database.Pragma(FormattableString.Invariant($"busy_timeout = {(long)busyTimeout.TotalMilliseconds}"));

            // Pages that were damaged are noticed as soon as they are read, and what stands in the schema cannot call anything.
            database.Pragma("cell_size_check = ON");
            database.Pragma("trusted_schema = OFF");
            return database;
        }
        catch (SqliteException error)
        {
            connection.Dispose();
            throw StoreErrors.Translate(error, file);
        }
        catch
        {
            connection.Dispose();
            throw;
        }
    }

    /// <summary>Runs a pragma that answers nothing that matters.</summary>
    /// <param name="text">Without the word PRAGMA.</param>
    public void Pragma(string text)
    {
        using var command = Command("PRAGMA " + text);
        command.ExecuteNonQuery();
    }

    /// <summary>Runs a statement of a migration once.</summary>
    /// <param name="sql">Statement.</param>
    public void RunOnce(string sql)
    {
        using var command = Command(sql);
        command.ExecuteNonQuery();
    }

    /// <summary>Reads one number.</summary>
    /// <param name="sql">Statement.</param>
    /// <param name="values">Values of its parameters $1, $2 and so on.</param>
    public long Whole(string sql, params ReadOnlySpan<object?> values)
    {
        using var rows = Query("database", sql, values);
        return rows.Next() ? rows.Whole(0) : throw rows.Damaged(sql, "the answer is missing");
    }

    /// <summary>Runs a statement.</summary>
    /// <param name="sql">Statement; prepared once.</param>
    /// <param name="values">Values of its parameters $1, $2 and so on.</param>
    /// <returns>Number of rows changed.</returns>
    public int Run(string sql, params ReadOnlySpan<object?> values) => Statement(sql, values).ExecuteNonQuery();

    /// <summary>Runs a query.</summary>
    /// <param name="table">Table, for messages.</param>
    /// <param name="sql">Query; prepared once, so that the same one cannot be open twice.</param>
    /// <param name="values">Values of its parameters $1, $2 and so on.</param>
    public RowCursor Query(string table, string sql, params ReadOnlySpan<object?> values) =>
        new(File, table, Statement(sql, values).ExecuteReader());

    /// <summary>Does something with the database and tells errors as the store tells them.</summary>
    /// <param name="work">What to do.</param>
    /// <exception cref="StoreException">The file cannot be read or written.</exception>
    public T Guarded<T>(Func<Database, T> work)
    {
        try
        {
            return work(this);
        }
        catch (Exception error) when (StoreErrors.IsOfFile(error))
        {
            throw StoreErrors.Translate(error, File);
        }
    }

    /// <summary>For a file that was refused: closing the connection then moves nothing from its log into it.</summary>
    public void LeaveAsItIs() => raw.sqlite3_db_config(Handle, KeepLogOnClose, 1, out _);

    /// <summary>Whether a transaction is open.</summary>
    public bool InTransaction => raw.sqlite3_get_autocommit(Handle) == 0;

    /// <inheritdoc/>
    public void Dispose()
    {
        foreach (var statement in _statements.Values)
        {
            statement.Dispose();
        }

        _connection.Dispose();
    }

    private SqliteCommand Command(string sql)
    {
        var command = _connection.CreateCommand();
#pragma warning disable CA2100 // Every text is a constant of this assembly or an embedded migration.
        command.CommandText = sql;
#pragma warning restore CA2100
        command.CommandTimeout = _timeoutSeconds;
        return command;
    }

    /// <exception cref="InvalidOperationException">A text holds the character U+0000; callers refuse such text before they come here.</exception>
    private SqliteCommand Statement(string sql, ReadOnlySpan<object?> values)
    {
        foreach (var value in values)
        {
            if (value is string text && text.Contains('\0', StringComparison.Ordinal))
            {
                throw new InvalidOperationException("A text for the database holds the character U+0000, at which SQLite's functions end it. Nothing was written.");
            }
        }

        if (!_statements.TryGetValue(sql, out var command))
        {
            command = Command(sql);
            for (var i = 0; i < values.Length; i++)
            {
                command.Parameters.Add(new SqliteParameter { ParameterName = FormattableString.Invariant($"${i + 1}") });
            }

            _statements.Add(sql, command);
        }

        for (var i = 0; i < values.Length; i++)
        {
            command.Parameters[i].Value = values[i] ?? DBNull.Value;
        }

        return command;
    }
}
