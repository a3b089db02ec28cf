using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>Held while a process uses a folder; the operating system lets it go when the process ends, however it ends.</summary>
internal sealed class FolderLock : IDisposable
{
    private const string FileName = "lock";
    private const int WouldBlockOnLinux = 11;
    private const int WouldBlockOnMac = 35;
    private const int SharingViolationOnWindows = 32;

    private readonly FileStream _file;

    private FolderLock(FileStream file) => _file = file;

    /// <summary>Makes the folder where there is none, and takes it.</summary>
    /// <param name="folder">Folder.</param>
    /// <exception cref="StoreException">Another process has it, or it may not be written.</exception>
    public static FolderLock Take(string folder)
    {
        try
        {
            Directory.CreateDirectory(folder);
        }
        catch (Exception error) when (StoreErrors.IsOfFile(error))
        {
            throw StoreErrors.Translate(error, folder);
        }

        try
        {
            return new FolderLock(new FileStream(Path.Combine(folder, FileName), FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None));
        }
        catch (IOException error) when ((error.HResult & 0xFFFF) is WouldBlockOnLinux or WouldBlockOnMac or SharingViolationOnWindows)
        {
            throw new StoreException(
                StoreTrouble.Locked, $"The records in {folder} are in use by another process. Nothing was changed. Use --server to speak to it, or stop the other.", error);
        }
        catch (Exception error) when (StoreErrors.IsOfFile(error))
        {
            throw StoreErrors.Translate(error, folder);
        }
    }

    /// <inheritdoc/>
    public void Dispose() => _file.Dispose();
}
