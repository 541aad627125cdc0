using System.IO.Compression;

namespace Permute.Nifti.Tests;

/// <summary>Gzip is known by its bytes (RFC 1952), unpacked as far as the header asks, and checked by its own checksum.</summary>
public class GzipTests
{
    private static readonly double[] Expected = [.. Enumerable.Range(0, 24).Select(i => (double)i)];

    [Theory]
    [InlineData("named-plain.nii", true)]
    [InlineData("named-gzip.nii.gz", false)]
    public void The_bytes_tell_gzip_and_not_the_name(string name, bool gzip)
    {
        byte[] file = new RawImage().File();
        using var scratch = new Scratch();
        Assert.Equal(Expected, NiftiFile.ReadAll(scratch.Put(name, gzip ? Scratch.Gzip(file) : file)).Values);
    }

    [Fact]
    public void Packed_voxels_that_end_early_are_refused_as_truncated()
    {
        using var scratch = new Scratch();
        string path = scratch.Put("short.nii.gz", Scratch.Gzip(new RawImage().File()[..^5]));
        Assert.Contains("truncated: header promises 448 bytes, the file has 443 after unpacking", Refused(path));
    }

    [Fact]
    public void A_packed_header_that_ends_early_is_refused()
    {
        using var scratch = new Scratch();
        Assert.Contains("ends after 200 bytes", Refused(scratch.Put("short.nii.gz", Scratch.Gzip(new RawImage().File()[..200]))));
    }

    [Theory]
    [InlineData(0.1)]
    [InlineData(0.5)]
    [InlineData(0.95)]
    public void A_gzip_file_cut_short_is_refused_as_truncated(double kept)
    {
        byte[] packed = Scratch.Gzip(Noise(20_000).File());
        using var scratch = new Scratch();
        Assert.Contains("truncated", Refused(scratch.Put("cut.nii.gz", packed[..(int)(kept * packed.Length)])));
    }

    [Theory]
    [InlineData(0.02)]
    [InlineData(0.5)]
    public void Damaged_gzip_data_are_refused(double where)
    {
        byte[] packed = Scratch.Gzip(Noise(20_000).File());
        for (int i = 0; i < 64; i++) packed[(int)(where * packed.Length) + i] ^= 0xa5;
        using var scratch = new Scratch();
        Assert.Contains("damaged", Refused(scratch.Put("damaged.nii.gz", packed)));
    }

    [Fact]
    public void A_checksum_that_disagrees_is_refused_before_the_last_voxels_are_handed_on()
    {
        byte[] packed = Scratch.Gzip(new RawImage().File());
        packed[^6] ^= 1; // RFC 1952: CRC-32 of the data, then their length, 4 bytes each
        using var scratch = new Scratch();
        string path = scratch.Put("altered.nii.gz", packed);
        var error = Assert.Throws<NiftiException>(() => NiftiFile.Read(path, (_, _, _) => Assert.Fail("a voxel that was not checked")));
        Assert.Contains("damaged", error.Message);
    }

    [Fact]
    public void No_more_is_unpacked_than_the_header_promises()
    {
        // Far more bytes follow than the header speaks of, and they are damaged: who unpacked them would stumble.
        var raw = new RawImage();
        byte[] packed = Scratch.Gzip([.. raw.File(), .. Noise(100_000).Image()]);
        for (int i = 0; i < 64; i++) packed[packed.Length / 2 + i] ^= 0xa5;
        Assert.Throws<InvalidDataException>(() =>
        {
            using var whole = new GZipStream(new MemoryStream(packed), CompressionMode.Decompress);
            whole.CopyTo(Stream.Null);
        });
        using var scratch = new Scratch();
        Assert.Equal(Expected, NiftiFile.ReadAll(scratch.Put("bomb.nii.gz", packed)).Values);
    }

    [Fact]
    public void Large_images_arrive_in_order_in_slabs()
    {
        var raw = Noise(150_001);
        using var scratch = new Scratch();
        string path = scratch.Put("large.nii.gz", Scratch.Gzip(raw.File()));
        var seen = new List<double>();
        int largest = 0;
        var header = NiftiFile.Read(path, (h, offset, values) =>
        {
            Assert.Equal(150_001, h.VoxelCount);
            Assert.Equal(seen.Count, offset);
            largest = Math.Max(largest, values.Length);
            seen.AddRange(values);
        });
        Assert.Equal(65_536, largest);
        Assert.Equal(raw.Voxels.Select(v => (double)BitConverter.ToSingle(v)), seen);
        Assert.Equal([150_001, 1, 1], header.Dimensions);
    }

    [Fact]
    public void An_error_of_the_receiver_passes_through()
    {
        using var scratch = new Scratch();
        string path = scratch.Put("image.nii.gz", Scratch.Gzip(new RawImage().File()));
        Assert.Throws<InvalidDataException>(() => NiftiFile.Read(path, (_, _, _) => throw new InvalidDataException("its own")));
    }

    /// <summary>
    /// A row of numbers that packs badly: a linear congruential sequence (Numerical Recipes' constants, from memory; any would do).
    /// </summary>
    private static RawImage Noise(int count)
    {
        uint state = 1;
        return new(version: 2)
        {
            Dim = [1, count, 1, 1, 1, 1, 1, 1],
            Voxels = [.. Enumerable.Range(0, count).Select(_ => BitConverter.GetBytes((float)(state = 1664525 * state + 1013904223)))],
        };
    }

    private static string Refused(string path)
    {
        string message = Assert.Throws<NiftiException>(() => NiftiFile.ReadAll(path)).Message;
        Assert.Contains(path, message);
        return message;
    }
}
