using System.Text;
using Grpc.Core;

namespace PermitScreen.Cli.Connection;

/// <summary>Who changes the records.</summary>
/// <param name="Actor">Who.</param>
internal sealed record Author(string Actor)
{
    private const string Key = "x-permitscreen-actor";

    /// <summary>What goes with a writing call. Metadata is ASCII; a name beyond it travels as UTF-8 bytes under the key's binary form.</summary>
    public Metadata Metadata() => Actor.All(c => c is >= ' ' and <= '~')
        ? new Metadata { { Key, Actor } }
        : new Metadata { { Key + Grpc.Core.Metadata.BinaryHeaderSuffix, Encoding.UTF8.GetBytes(Actor) } };
}
