namespace Permute.Nifti.Tests;

/// <summary>
/// Whatever is wrong with a file gets one sentence that names it. What is allowed is the standard's say (nifti1.h, nifti2.h).
/// </summary>
public class RefusalTests
{
    [Fact]
    public void A_missing_file_is_refused()
    {
        using var scratch = new Scratch();
        Refused(scratch["nowhere.nii"], "no such file");
    }

    [Fact]
    public void A_folder_is_refused()
    {
        using var scratch = new Scratch();
        Directory.CreateDirectory(scratch["folder.nii"]);
        Refused(scratch["folder.nii"], "is a folder");
    }

    [Fact]
    public void An_empty_file_is_refused() => Refused([], "is empty");

    [Theory]
    [InlineData(1, 1)]
    [InlineData(1, 3)]
    [InlineData(1, 347)]
    [InlineData(2, 539)]
    public void A_header_cut_short_is_refused(int version, int length) =>
        Refused(new RawImage(version).File()[..length], $"ends after {length} bytes", version == 1 ? "348" : "540");

    [Theory]
    [InlineData("This is a text, not an image at all.")]
    [InlineData("\u0001\u0002\u0003\u0004")]
    public void A_file_that_is_not_an_image_is_refused(string content) =>
        Refused(System.Text.Encoding.ASCII.GetBytes(content), "is not a NIfTI image", "348 or 540");

    [Fact]
    public void A_text_named_gz_is_refused_with_the_hint_that_it_is_not_gzip()
    {
        using var scratch = new Scratch();
        Refused(scratch.Put("bad.nii.gz", "This is a text."u8.ToArray()), "nor is it gzip");
    }

    [Fact]
    public void A_wrong_header_size_is_refused() => Refused(new RawImage { SizeofHdr = 350 }.File(), "350");

    [Theory]
    [InlineData(1, "\0\0\0\0", "ANALYZE 7.5")]
    [InlineData(1, "abc\0", "ANALYZE 7.5")]
    [InlineData(1, "n+2\0", "NIfTI-1's size")]
    [InlineData(2, "n+1\0\r\n\u001a\n", "NIfTI-2's size")]
    [InlineData(2, "n+2\0\n\n\u001a\n", "line ends")]
    public void A_wrong_magic_is_refused(int version, string magic, string expected) =>
        Refused(new RawImage(version) { Magic = magic }.File(), expected);

    [Theory]
    [InlineData(-1)]
    [InlineData(0)]
    [InlineData(8)]
    [InlineData(300)]
    public void A_number_of_dimensions_outside_1_to_7_is_refused(int count) =>
        Refused(new RawImage { Dim = [count, 2, 3, 4, 1, 1, 1, 1] }.File(), $"{count} dimensions", "1 to 7");

    [Theory]
    [InlineData(1, 0)]
    [InlineData(1, -5)]
    [InlineData(2, -5)]
    public void A_length_below_1_is_refused(int version, int length) =>
        Refused(new RawImage(version) { Dim = [3, 2, length, 4, 1, 1, 1, 1] }.File(), "dimension 2", $"length {length}");

    [Theory]
    [InlineData(1, 1, "1-bit")]
    [InlineData(32, 64, "complex64")]
    [InlineData(128, 24, "RGB colour")]
    [InlineData(1536, 128, "float128")]
    [InlineData(1792, 128, "complex128")]
    [InlineData(2048, 256, "complex256")]
    [InlineData(2304, 32, "RGBA colour")]
    [InlineData(0, 0, "not a voxel type")]
    [InlineData(17, 32, "not a voxel type")]
    public void A_type_that_is_not_one_real_number_is_refused_by_its_name(short datatype, short bitpix, string expected) =>
        Refused(new RawImage { Datatype = datatype, Bitpix = bitpix }.File(), expected, $"datatype {datatype}");

    [Fact]
    public void A_width_that_contradicts_the_type_is_refused() =>
        Refused(new RawImage { Bitpix = 16 }.File(), "32 bits", "bitpix says 16");

    [Theory]
    [InlineData(1, 0)]
    [InlineData(1, 348)]
    [InlineData(1, -1000)]
    [InlineData(1, 352.5)]
    [InlineData(1, double.NaN)]
    [InlineData(1, 1e30)]
    [InlineData(2, 352)]
    public void An_offset_that_cannot_be_is_refused(int version, double offset) =>
        Refused(new RawImage(version) { VoxOffset = offset }.File(), "vox_offset", version == 1 ? "from 352 on" : "from 544 on");

    [Fact]
    public void Dimensions_whose_product_overflows_are_refused() =>
        Refused(new RawImage(2) { Dim = [4, 1L << 20, 1L << 20, 1L << 20, 1L << 20, 1, 1, 1] }.File(), "more bytes than any file");

    [Fact]
    public void Dimensions_whose_bytes_overflow_are_refused() =>
        Refused(new RawImage(2) { Dim = [3, 1L << 21, 1L << 21, 1L << 20, 1, 1, 1, 1] }.File(), "more bytes than any file");

    [Fact]
    public void A_scaling_intercept_that_is_no_number_is_refused() =>
        Refused(new RawImage { Slope = 2, Inter = double.NaN }.File(), "scl_inter");

    [Fact]
    public void An_sform_that_is_not_finite_is_refused() =>
        Refused(new RawImage { Srow = [2, 0, 0, double.NaN, 0, 2, 0, 0, 0, 0, 2, 0] }.File(), "sform");

    [Fact]
    public void An_sform_of_zeros_is_refused() => Refused(new RawImage { Srow = new double[12] }.File(), "sform");

    [Fact]
    public void An_axis_of_one_voxel_may_have_no_length()
    {
        using var scratch = new Scratch();
        var raw = new RawImage { Dim = [2, 6, 4, 1, 1, 1, 1, 1], Srow = [2, 0, 0, 0, 0, 2, 0, 0, 0, 0, 0, 0] };
        Assert.Equal([6, 4, 1], NiftiFile.ReadHeader(scratch.Put("slice.nii", raw.File())).Dimensions);
    }

    [Theory, InlineData(1), InlineData(2)]
    public void A_file_one_byte_short_is_refused_as_truncated(int version)
    {
        byte[] file = new RawImage(version).File();
        Refused(file[..^1], "truncated", $"promises {file.Length} bytes", $"has {file.Length - 1}");
    }

    [Fact]
    public void Bytes_behind_the_last_voxel_are_of_no_account()
    {
        using var scratch = new Scratch();
        string path = scratch.Put("long.nii", [.. new RawImage().File(), 1, 2, 3]);
        Assert.Equal(Enumerable.Range(0, 24).Select(i => (double)i), NiftiFile.ReadAll(path).Values);
    }

    [Theory]
    [InlineData("huge.nii", false)]
    [InlineData("huge.nii.gz", true)]
    public void A_header_that_promises_a_trillion_voxels_costs_no_memory(string name, bool gzip)
    {
        byte[] file = new RawImage(2) { Dim = [3, 10_000, 10_000, 10_000, 1, 1, 1, 1] }.File();
        using var scratch = new Scratch();
        string path = scratch.Put(name, gzip ? Scratch.Gzip(file) : file);
        long before = GC.GetAllocatedBytesForCurrentThread();
        var error = Assert.Throws<NiftiException>(() => NiftiFile.ReadAll(path));
        Assert.InRange(GC.GetAllocatedBytesForCurrentThread() - before, 0, 1_000_000);
        Assert.Contains("truncated", error.Message);
        Assert.Contains("4000000000544", error.Message);
        Assert.Contains(path, error.Message);
    }

    private static void Refused(byte[] file, params string[] words)
    {
        using var scratch = new Scratch();
        Refused(scratch.Put("bad.nii", file), words);
    }

    /// <summary>Every way of reading says the same: one sentence, with the file's name and these words.</summary>
    private static void Refused(string path, params string[] words)
    {
        string[] messages =
        [
            Assert.Throws<NiftiException>(() => NiftiFile.ReadHeader(path)).Message,
            Assert.Throws<NiftiException>(() => NiftiFile.ReadAll(path)).Message,
            Assert.Throws<NiftiException>(() => NiftiFile.Read(path, (_, _, _) => Assert.Fail("a voxel of a refused file"))).Message,
        ];
        Assert.Single(messages.Distinct());
        Assert.StartsWith(path + ": ", messages[0]);
        Assert.EndsWith(".", messages[0]);
        Assert.DoesNotContain("\n", messages[0]);
        foreach (string word in words) Assert.Contains(word, messages[0]);
    }
}
