using PermitScreen.Cli.Connection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Importing;

/// <summary>What was refused: by this program, because it could not be read, and by the service. The first of each are kept, all are counted.</summary>
internal sealed class Refusals
{
    /// <summary>How many are told.</summary>
    public const int Most = 200;

    private readonly List<ImportRefusal> _first = [];
    private int _unreadable;
    private int _byService;

    /// <summary>The first of them.</summary>
    public IReadOnlyList<ImportRefusal> First => _first;

    /// <summary>Items refused.</summary>
    public int Count => _unreadable + _byService;

    /// <summary>Items that could not be read.</summary>
    public int Unreadable => _unreadable;

    /// <summary>Adds an item that cannot be read.</summary>
    public void Add(SourceItem item)
    {
        _unreadable += item.Counted;
        if (_first.Count < Most)
        {
            var refusal = new ImportRefusal { Origin = item.Origin };
            refusal.Faults.AddRange(item.Faults.Select(f => new FieldFault { Field = f.Path, Description = f.Message }));
            _first.Add(refusal);
        }
    }

    /// <summary>Adds what the service refused, of all pieces.</summary>
    public async Task AddAsync(ServiceConnection connection, Import import, CancellationToken cancellation)
    {
        _byService = import.RefusedCount;
        if (_byService == 0 || _first.Count >= Most)
        {
            return;
        }

        _first.AddRange(await Listings.UpToAsync(
            async (size, token) =>
            {
                var request = new ListImportRefusalsRequest { Parent = import.Name, PageSize = size, PageToken = token };
                var page = await connection.Imports.ListImportRefusalsAsync(request, connection.Call(cancellation));
                return ((IEnumerable<ImportRefusal>)page.Refusals, page.NextPageToken);
            },
            Most - _first.Count));
    }
}
