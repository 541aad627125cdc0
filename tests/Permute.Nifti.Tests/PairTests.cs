namespace Permute.Nifti.Tests;

/// <summary>Header/image pairs, by either name, packed or not (nifti1.h: magic "ni1", vox_offset counts in the image file).</summary>
public class PairTests
{
    private static readonly double[] Expected = [.. Enumerable.Range(0, 24).Select(i => (double)i)];

    public static TheoryData<int, string, string> Pairs => new()
    {
        { 1, ".hdr", ".img" },
        { 2, ".hdr", ".img" },
        { 1, ".hdr.gz", ".img.gz" },
        { 1, ".hdr", ".img.gz" },
        { 1, ".hdr.gz", ".img" },
        { 2, ".HDR", ".IMG" },
    };

    [Theory, MemberData(nameof(Pairs))]
    public void A_pair_is_read_by_either_name(int version, string hdr, string img)
    {
        var raw = Pair(version);
        using var scratch = new Scratch();
        string header = Put(scratch, "brain" + hdr, raw.Header()), image = Put(scratch, "brain" + img, raw.Image());
        Assert.Equal(Expected, NiftiFile.ReadAll(header).Values);
        Assert.Equal(Expected, NiftiFile.ReadAll(image).Values);
        Assert.Equal([2, 3, 4], NiftiFile.ReadHeader(image).Dimensions);
    }

    [Fact]
    public void Voxels_may_begin_further_on_in_the_image()
    {
        var raw = Pair(1);
        raw.VoxOffset = 10;
        using var scratch = new Scratch();
        Put(scratch, "brain.hdr", raw.Header());
        Assert.Equal(Expected, NiftiFile.ReadAll(Put(scratch, "brain.img", [.. new byte[10], .. raw.Image()])).Values);
    }

    [Fact]
    public void A_header_without_its_image_is_refused()
    {
        using var scratch = new Scratch();
        string path = Put(scratch, "brain.hdr", Pair(1).Header());
        string message = Assert.Throws<NiftiException>(() => NiftiFile.ReadAll(path)).Message;
        Assert.StartsWith(path, message);
        Assert.Contains("brain.img, does not exist", message);
    }

    [Fact]
    public void An_image_without_its_header_is_refused()
    {
        using var scratch = new Scratch();
        string path = Put(scratch, "brain.img", Pair(1).Image());
        string message = Assert.Throws<NiftiException>(() => NiftiFile.ReadAll(path)).Message;
        Assert.StartsWith(path, message);
        Assert.Contains("brain.hdr, does not exist", message);
    }

    [Fact]
    public void A_truncated_image_is_refused_by_its_own_name()
    {
        using var scratch = new Scratch();
        string header = Put(scratch, "brain.hdr", Pair(1).Header()), image = Put(scratch, "brain.img", Pair(1).Image()[..^1]);
        string message = Assert.Throws<NiftiException>(() => NiftiFile.ReadHeader(header)).Message;
        Assert.Equal($"{image}: truncated: header promises 96 bytes, the file has 95; fetch or write the file again.", message);
    }

    [Fact]
    public void A_header_of_a_pair_under_another_name_is_refused()
    {
        using var scratch = new Scratch();
        string path = Put(scratch, "brain.nii", Pair(1).Header());
        string message = Assert.Throws<NiftiException>(() => NiftiFile.ReadAll(path)).Message;
        Assert.StartsWith(path, message);
        Assert.Contains("not named .hdr", message);
    }

    [Fact]
    public void An_image_whose_header_claims_the_voxels_is_refused()
    {
        using var scratch = new Scratch();
        Put(scratch, "brain.hdr", new RawImage().File());
        string path = Put(scratch, "brain.img", new RawImage().Image());
        string message = Assert.Throws<NiftiException>(() => NiftiFile.ReadAll(path)).Message;
        Assert.StartsWith(path, message);
        Assert.Contains("brain.hdr", message);
    }

    private static RawImage Pair(int version) =>
        new(version) { Magic = version == 1 ? "ni1\0" : "ni2\0\r\n\u001a\n", VoxOffset = 0 };

    private static string Put(Scratch scratch, string name, byte[] bytes) =>
        scratch.Put(name, name.EndsWith(".gz", StringComparison.Ordinal) ? Scratch.Gzip(bytes) : bytes);
}
