using System.Buffers.Binary;
using System.Text;

namespace Permute.Nifti;

/// <summary>Numbers and texts at fixed places of a header, in either byte order.</summary>
internal readonly ref struct ByteFields(ReadOnlySpan<byte> bytes, bool bigEndian)
{
    private readonly ReadOnlySpan<byte> bytes = bytes;

    public short Int16(int at) =>
        bigEndian ? BinaryPrimitives.ReadInt16BigEndian(bytes[at..]) : BinaryPrimitives.ReadInt16LittleEndian(bytes[at..]);

    public int Int32(int at) =>
        bigEndian ? BinaryPrimitives.ReadInt32BigEndian(bytes[at..]) : BinaryPrimitives.ReadInt32LittleEndian(bytes[at..]);

    public long Int64(int at) =>
        bigEndian ? BinaryPrimitives.ReadInt64BigEndian(bytes[at..]) : BinaryPrimitives.ReadInt64LittleEndian(bytes[at..]);

    public double Single(int at) => BitConverter.Int32BitsToSingle(Int32(at));

    public double Double(int at) => BitConverter.Int64BitsToDouble(Int64(at));

    public double[] Singles(int at, int count)
    {
        var values = new double[count];
        for (int i = 0; i < count; i++) values[i] = Single(at + 4 * i);
        return values;
    }

    public double[] Doubles(int at, int count)
    {
        var values = new double[count];
        for (int i = 0; i < count; i++) values[i] = Double(at + 8 * i);
        return values;
    }

    /// <summary>The text of a field that ends at its first zero byte, or fills it.</summary>
    public string Text(int at, int length)
    {
        var field = bytes.Slice(at, length);
        int end = field.IndexOf((byte)0);
        return Encoding.UTF8.GetString(end < 0 ? field : field[..end]);
    }
}
