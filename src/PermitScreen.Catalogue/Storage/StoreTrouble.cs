namespace PermitScreen.Catalogue.Storage;

/// <summary>What keeps records from being read or written.</summary>
public enum StoreTrouble
{
    /// <summary>Something else; the message says what.</summary>
    Other,

    /// <summary>Another process holds the file.</summary>
    Locked,

    /// <summary>No room is left.</summary>
    Full,

    /// <summary>The file, or something in it, is damaged.</summary>
    Damaged,

    /// <summary>The file was written by a newer version of this program.</summary>
    NewerSchema,

    /// <summary>The file or folder may not be written, or read.</summary>
    NotAllowed,

    /// <summary>The device failed to read or write.</summary>
    Device,
}
