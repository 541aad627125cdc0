using System.Buffers.Binary;

namespace Permute.Nifti;

/// <summary>Reads a header's bytes and finds out version and byte order.</summary>
internal static class HeaderReader
{
    /// <summary>The header at the start of <paramref name="source"/>, which afterwards stands behind it.</summary>
    public static NiftiHeader Read(ByteSource source)
    {
        Span<byte> bytes = stackalloc byte[LayoutV2.Size];
        int got = source.Fill(bytes[..4]);
        int first = got == 4 ? BinaryPrimitives.ReadInt32LittleEndian(bytes) : 0;
        bool bigEndian = first is not (LayoutV1.Size or LayoutV2.Size);
        int size = bigEndian ? BinaryPrimitives.ReverseEndianness(first) : first;
        if (got == 4 && size is not (LayoutV1.Size or LayoutV2.Size)) throw NotNifti(source, first);

        if (got == 4) got += source.Fill(bytes[4..size]);
        if (got < Math.Max(size, 4))
            throw new NiftiException(
                $"{source.Path}: ends after {got} bytes, within the header, which has {(got < 4 ? "348 or 540" : size)}; fetch or "
                    + "write the file again.");

        bytes = bytes[..size];
        if (size == LayoutV1.Size) return HeaderDecoder.Decode(LayoutV1.Read(bytes, bigEndian), 1, bigEndian, source.Path);
        var fields = LayoutV2.Read(bytes, bigEndian);
        if (fields.Magic is "n+2" or "ni2" && !LayoutV2.TransferIntact(bytes))
            throw new NiftiException($"{source.Path}: its line ends were altered by a transfer as text, and the voxels with them; "
                + "transfer the original again as binary.");
        return HeaderDecoder.Decode(fields, 2, bigEndian, source.Path);
    }

    private static NiftiException NotNifti(ByteSource source, int first)
    {
        bool misnamed = !source.IsGzip && source.Path.EndsWith(".gz", StringComparison.OrdinalIgnoreCase);
        string hint = misnamed ? " (nor is it gzip, as its name says)" : "";
        return new($"{source.Path}: is not a NIfTI image{hint}: it begins with the number {first}, and a header with its own size, "
            + "348 or 540; convert the file to NIfTI.");
    }
}
