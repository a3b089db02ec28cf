using System.Security.Cryptography;
using Google.Protobuf;

namespace PermitScreen.Service.Mapping;

/// <summary>Fingerprints of documents.</summary>
internal static class Etags
{
    private const int Digits = 24;

    /// <summary>First digits of the SHA-256 over the message's bytes, its output-only fields set aside.</summary>
    /// <param name="message">A message without maps, whose serialisation is therefore one and the same every time.</param>
    public static string Of(IMessage message) => Convert.ToHexStringLower(SHA256.HashData(message.ToByteArray()))[..Digits];
}
