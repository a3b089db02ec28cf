using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Damage;

/// <summary>Records that were changed behind the program's back with SQL are found by the verification.</summary>
public sealed class TamperingTests : IDisposable
{
    private readonly TestFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Theory]
    [InlineData("UPDATE revisions SET actor = 'somebody' WHERE name = 'structures/S-00003' AND to_version IS NULL", "revisions")]
    [InlineData("UPDATE revisions SET to_version = NULL WHERE name = 'structures/S-00001' AND from_version > 12", "revisions")]
    [InlineData("DELETE FROM revisions WHERE name = 'structures/S-00005' AND from_version < 12", "revisions")]
    [InlineData("DELETE FROM revisions WHERE name = 'structures/S-00011'; DELETE FROM resources WHERE name = 'structures/S-00011'", "catalogue versions")]
    [InlineData("DELETE FROM resources WHERE name = 'structures/S-00004'", "revisions")]
    [InlineData("UPDATE change_sets SET reason = 'another' WHERE version = 4", "catalogue versions")]
    [InlineData("DELETE FROM change_sets WHERE version = 4", "catalogue versions")]
    [InlineData("UPDATE change_sets SET version = 999 WHERE version = 4", "catalogue versions")]
    [InlineData("DELETE FROM audit WHERE sequence > 20", "audit entries")]
    [InlineData("DELETE FROM audit WHERE sequence = 7", "audit entries")]
    [InlineData("UPDATE audit SET sequence = -1 WHERE sequence = 7; UPDATE audit SET sequence = 7 WHERE sequence = 8; UPDATE audit SET sequence = 8 WHERE sequence = -1", "audit entries")]
    [InlineData("UPDATE audit SET reason = 'another' WHERE sequence = 7", "audit entries")]
    [InlineData("UPDATE audit SET instant_ms = instant_ms + 1 WHERE sequence = 7", "audit entries")]
    [InlineData("INSERT INTO audit SELECT 999, action, subject, actor, reason, instant_ms, NULL, records, previous, hash FROM audit WHERE sequence = 7", "audit entries")]
    [InlineData("UPDATE contents SET bytes = x'00' WHERE rowid = 3", "contents")]
    [InlineData("DELETE FROM contents WHERE rowid = 3", "revisions")]
    [InlineData("INSERT INTO contents VALUES (x'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855', x'')", "contents")]
    [InlineData("UPDATE content_lines SET line = zeroblob(32) WHERE line = (SELECT min(line) FROM content_lines WHERE content = (SELECT min(content) FROM content_lines)) AND content = (SELECT min(content) FROM content_lines)", "lines that contents need")]
    [InlineData("UPDATE requests SET version = 99 WHERE request_id = 'r3'", "requests and backlog")]
    [InlineData("UPDATE backlog SET structure = 'x' WHERE failure IS NOT NULL", "requests and backlog")]
    [InlineData("UPDATE notes SET value = '9'", "requests and backlog")]
    [InlineData("DELETE FROM import_items", "imports")]
    [InlineData("DELETE FROM import_refusals", "imports")]
    [InlineData("UPDATE imports SET staged = 5 WHERE import_id = 'i1'", "imports")]
    public async Task What_was_changed_is_found(string sql, string stage)
    {
        await SmallRecords.MakeAsync(_folder.Path);
        Assert.True(Run(sql) > 0);
        await using var records = SqliteStores.Open(_folder.Path);
        var problems = await records.Keeping.Problems();
        if (sql.Contains("DELETE FROM contents", StringComparison.Ordinal))
        {
            Assert.Contains(problems, p => p.Contains("names a row of contents that is missing", StringComparison.Ordinal));
            return;
        }

        Assert.Contains(problems, p => p.StartsWith(stage, StringComparison.Ordinal));
    }

    [Fact]
    public async Task Every_problem_is_told_and_not_only_the_first()
    {
        await SmallRecords.MakeAsync(_folder.Path);
        Run("UPDATE revisions SET actor = 'x' WHERE name IN ('structures/S-00003', 'structures/S-00006'); UPDATE audit SET actor = 'x' WHERE sequence IN (3, 9); UPDATE contents SET bytes = x'00' WHERE rowid IN (2, 4)");
        await using var records = SqliteStores.Open(_folder.Path);
        var problems = await records.Keeping.Problems();
        Assert.Equal(4, problems.Count(p => p.StartsWith("revisions: ", StringComparison.Ordinal) && p.Contains("does not fit its checksum", StringComparison.Ordinal)));
        Assert.Equal(2, problems.Count(p => p.StartsWith("audit entries: ", StringComparison.Ordinal) && p.Contains("does not fit its hash", StringComparison.Ordinal)));
        Assert.Equal(2, problems.Count(p => p.StartsWith("contents: ", StringComparison.Ordinal)));
    }

    /// <summary>A forger who knows the code makes the row's checksum anew; the audit chain still holds the revision as it was.</summary>
    [Fact]
    public async Task A_revision_with_a_forged_checksum_is_found_by_the_audit_chain()
    {
        await SmallRecords.MakeAsync(_folder.Path);
        RevisionHead head;
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            head = (await records.Catalogue.ReadHistoryAsync(ResourceKind.Structure, Name(3), CancellationToken.None))[0];
        }

        var forged = head with { Provenance = head.Provenance with { Actor = "somebody" } };
        var check = RevisionRow.Write(new RowForm(RevisionRow.Table), forged).Add(forged.ToVersion).Check();
        Run($"UPDATE revisions SET actor = 'somebody', \"check\" = x'{Convert.ToHexString(check)}' WHERE name = '{Name(3)}' AND to_version IS NULL");
        await using var again = SqliteStores.Open(_folder.Path);
        Assert.Equal("somebody", (await again.Catalogue.ReadHistoryAsync(ResourceKind.Structure, Name(3), CancellationToken.None))[0].Provenance.Actor);
        Assert.Contains(await again.Keeping.Problems(), p => p.Contains("are not those of audit entry", StringComparison.Ordinal));
    }

    /// <summary>Whoever cuts the log off and makes the version row anew is found only by a hash that was noted down outside.</summary>
    [Fact]
    public async Task A_log_that_was_cut_off_with_skill_is_found_by_a_hash_noted_down_outside()
    {
        AuditEntry newest;
        AuditEntry before;
        VersionRow row;
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            await records.Catalogue.Done(Add(Structure("structures/a", "a")));
            await records.Imports.BeginAsync(Import("i1"), CancellationToken.None);
            await records.Imports.CancelAsync("i1", By("x"), CancellationToken.None);
            var entries = await records.Catalogue.ReadAuditAsync(null, 2, CancellationToken.None);
            (newest, before) = (entries[0], entries[1]);
            row = records.File.ReadVersion();
        }

        using (var database = Database.Open(_folder.File("catalogue.db"), SqliteOpenMode.ReadWrite, TimeSpan.Zero))
        {
            database.Run("DELETE FROM audit WHERE sequence = $1", newest.Sequence);
            (row with { AuditSequence = before.Sequence, AuditHash = before.Hash }).Update(database);
        }

        await using var again = SqliteStores.Open(_folder.Path);
        Assert.Equal([], await again.Keeping.Problems());
        Assert.Equal([], await again.Keeping.Problems(before.Hash));
        Assert.Contains("noted down outside", Assert.Single(await again.Keeping.Problems(newest.Hash)), StringComparison.Ordinal);
    }

    private int Run(string sql)
    {
        using var connection = new SqliteConnection($"Data Source={_folder.File("catalogue.db")};Pooling=False");
        connection.Open();
        using var command = connection.CreateCommand();
        command.CommandText = "PRAGMA foreign_keys = OFF";
        command.ExecuteNonQuery();
        command.CommandText = sql;
        return command.ExecuteNonQuery();
    }
}
