namespace Permute.Nifti;

/// <summary>
/// A file that cannot be read or written as NIfTI. The message is one sentence for the user: the file, what was found, what was
/// expected, what to do.
/// </summary>
public sealed class NiftiException : Exception
{
    /// <summary>A fault described by <paramref name="message"/>.</summary>
    public NiftiException(string message) : base(message) { }

    /// <summary>A fault described by <paramref name="message"/>, brought about by <paramref name="inner"/>.</summary>
    public NiftiException(string message, Exception inner) : base(message, inner) { }
}
