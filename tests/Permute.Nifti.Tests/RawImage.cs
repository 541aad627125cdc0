using System.Text;

namespace Permute.Nifti.Tests;

/// <summary>
/// Files made byte by byte from the tables of offsets in nifti1.h and nifti2.h, apart from the code under test, so that any field can be
/// wrong. As it stands: 2 × 3 × 4 voxels, float32, values 0 to 23.
/// </summary>
public sealed class RawImage(int version = 1, bool bigEndian = false)
{
    public long[] Dim { get; set; } = [3, 2, 3, 4, 1, 1, 1, 1];
    public double[] Pixdim { get; set; } = [1, 2, 2, 2, 1, 1, 1, 1];
    public string Magic { get; set; } = version == 1 ? "n+1\0" : "n+2\0\r\n\u001a\n";
    public int SizeofHdr { get; set; } = version == 1 ? 348 : 540;
    public short Datatype { get; set; } = 16;
    public short Bitpix { get; set; } = 32;
    public double VoxOffset { get; set; } = version == 1 ? 352 : 544;
    public double Slope { get; set; } = 1;
    public double Inter { get; set; }
    public int Units { get; set; } = 2;
    public short SformCode { get; set; } = 1;
    public double[] Srow { get; set; } = [2, 0, 0, -1, 0, 2, 0, -2, 0, 0, 2, -3];
    public byte[][] Voxels { get; set; } = [.. Enumerable.Range(0, 24).Select(i => BitConverter.GetBytes((float)i))];

    /// <summary>The header alone.</summary>
    public byte[] Header()
    {
        var to = new byte[version == 1 ? 348 : 540];
        void Put(int at, byte[] little) => Ordered(little).CopyTo(to, at);
        void Int16(int at, long v) => Put(at, BitConverter.GetBytes((short)v));
        void Int32(int at, int v) => Put(at, BitConverter.GetBytes(v));
        void Real(int at, double v) => Put(at, version == 1 ? BitConverter.GetBytes((float)v) : BitConverter.GetBytes(v));
        Int32(0, SizeofHdr);
        if (version == 1)
        {
            for (int i = 0; i < 8; i++) Int16(40 + 2 * i, Dim[i]);
            Int16(70, Datatype);
            Int16(72, Bitpix);
            for (int i = 0; i < 8; i++) Real(76 + 4 * i, Pixdim[i]);
            Real(108, VoxOffset);
            Real(112, Slope);
            Real(116, Inter);
            to[123] = (byte)Units;
            Int16(254, SformCode);
            for (int i = 0; i < 12; i++) Real(280 + 4 * i, Srow[i]);
            Encoding.ASCII.GetBytes(Magic).CopyTo(to, 344);
        }
        else
        {
            Encoding.ASCII.GetBytes(Magic).CopyTo(to, 4);
            Int16(12, Datatype);
            Int16(14, Bitpix);
            for (int i = 0; i < 8; i++) Put(16 + 8 * i, BitConverter.GetBytes(Dim[i]));
            for (int i = 0; i < 8; i++) Real(104 + 8 * i, Pixdim[i]);
            Put(168, BitConverter.GetBytes((long)VoxOffset));
            Real(176, Slope);
            Real(184, Inter);
            Int32(348, SformCode);
            for (int i = 0; i < 12; i++) Real(400 + 8 * i, Srow[i]);
            Int32(500, Units);
        }
        return to;
    }

    /// <summary>The voxels alone.</summary>
    public byte[] Image() => [.. Voxels.SelectMany(Ordered)];

    /// <summary>Header, extension flag, voxels.</summary>
    public byte[] File() => [.. Header(), 0, 0, 0, 0, .. Image()];

    private byte[] Ordered(byte[] little) => bigEndian ? [.. little.Reverse()] : little;
}
