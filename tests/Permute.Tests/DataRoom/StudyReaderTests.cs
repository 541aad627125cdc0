using Permute.Data;
using Permute.Nifti;
using static Permute.Tests.DataRoom.Reading;

namespace Permute.Tests.DataRoom;

public sealed class StudyReaderTests : IDisposable
{
    private readonly Folder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void Every_value_arrives_at_its_image_and_voxel()
    {
        double[][] values = Folder.Values(3, 4 * 5 * 7);
        using var study = Read(new() { Images = folder.Images(3, [4, 5, 7]) });
        Assert.Equal(("derived", 140, 0), (study.MaskOrigin, study.Mask!.Count, study.Dropped));
        for (int v = 0; v < 140; v++)
            for (int i = 0; i < 3; i++) Assert.Equal(values[i][v], study.Data[i, v]);
        Assert.Empty(study.Notes);
    }

    [Fact]
    public void Values_in_double_precision_survive()
    {
        string[] paths = folder.Images(3, [4, 4, 4], all => Scale(all, 0.1), NiftiType.Float64);
        double[][] values = Folder.Values(3, 64);
        using var study = Read(new() { Images = paths });
        for (int v = 0; v < 64; v++)
            for (int i = 0; i < 3; i++) Assert.Equal(values[i][v] * 0.1, study.Data[i, v], 1e-14);
    }

    [Fact]
    public void A_given_mask_keeps_double_precision_too()
    {
        string[] paths = folder.Images(3, [4, 4, 4], all => Scale(all, 0.1), NiftiType.Float64);
        double[][] values = Folder.Values(3, 64);
        using var study = Read(new() { Images = paths, Mask = MaskOf(64, v => v % 3 == 0 ? 1 : 0, [4, 4, 4]) });
        Assert.Equal(22, study.Mask!.Count);
        for (int p = 0; p < 22; p++)
            for (int i = 0; i < 3; i++) Assert.Equal(values[i][3 * p] * 0.1, study.Data[i, p], 1e-14);
    }

    [Fact]
    public void The_volumes_of_a_4D_file_are_read_as_images_in_the_rows_asked()
    {
        double[][] values = Folder.Values(5, 4 * 5 * 3);
        string path = folder.Image("all.nii", [4, 5, 3, 5], [.. values.SelectMany(v => v)]);
        using var study = StudyReader.Read(StudyReader.Open(new() { Images = [path] }), [4, 1, 2], Nothing, 2);
        Assert.Equal(["all.nii volume 5", "all.nii volume 2", "all.nii volume 3"], study.Rows);
        int[] from = [4, 1, 2];
        for (int v = 0; v < 60; v++)
            for (int i = 0; i < 3; i++) Assert.Equal(values[from[i]][v], study.Data[i, v]);
        Assert.Equal([path], study.Sha256.Keys);
    }

    [Fact]
    public void The_table_follows_the_rows_used()
    {
        folder.Images(3, [3, 3, 3]);
        string table = folder.Text("s.tsv", "image\tage\na.nii\t30\nb.nii\t40\nc.nii\t50\n");
        using var study = StudyReader.Read(StudyReader.Open(new() { Study = table }), [2, 0], Nothing, 2);
        Assert.Equal(["50", "30"], study.Table!.Column("age"));
        Assert.Equal(["c.nii", "a.nii"], study.Rows);
        Assert.Equal(["a.nii", "c.nii", table], study.Sha256.Keys.Order(StringComparer.Ordinal).OrderBy(k => k.Length));
    }

    [Fact]
    public void Hashes_are_those_of_the_files()
    {
        string[] paths = folder.Images(2, [3, 3, 3]);
        string mask = MaskOf(27, _ => 1, [3, 3, 3]);
        using var study = Read(new() { Images = paths, Mask = mask });
        foreach (string path in new[] { paths[0], paths[1], mask })
            Assert.Equal(Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(File.ReadAllBytes(path))), study.Sha256[path]);
    }

    [Theory]
    [InlineData(new long[] { 6, 5, 1 })]
    [InlineData(new long[] { 6, 1, 5 })]
    [InlineData(new long[] { 9, 1, 1 })]
    [InlineData(new long[] { 1, 1, 9 })]
    public void Images_of_one_slice_or_row_are_legal(long[] size)
    {
        int voxels = (int)(size[0] * size[1] * size[2]);
        using var study = Read(new() { Images = folder.Images(3, size, all => all[0][0] = 0) });
        Assert.Equal(voxels - 1, study.Mask!.Count);
        Assert.Equal(-1, study.Mask.Position[0]);
    }

    [Fact]
    public void Any_number_of_threads_gives_the_same_study()
    {
        string[] paths = folder.Images(5, [9, 8, 7], all =>
        {
            for (int i = 0; i < 5; i++)
                for (int v = 0; v < 504; v++) all[i][v] = v % 9 < i ? 0 : v == 100 + i ? double.NaN : all[i][v] * 0.1;
        }, NiftiType.Float64);
        using Study one = Read(new() { Images = paths }, Mean, 1), two = Read(new() { Images = paths }, Mean, 2), eight = Read(new() { Images = paths }, Mean, 8);
        foreach (var other in new[] { two, eight })
        {
            Assert.Equal(one.Mask!.Voxels, other.Mask!.Voxels);
            Assert.Equal(one.Notes, other.Notes);
            Assert.Equal(one.Sha256.OrderBy(p => p.Key), other.Sha256.OrderBy(p => p.Key));
            for (int v = 0; v < one.Data.Voxels; v++)
                for (int i = 0; i < 5; i++) Assert.Equal(one.Data[i, v], other.Data[i, v]);
        }
    }

    [Fact]
    public void Progress_reaches_the_number_of_images()
    {
        var seen = new System.Collections.Concurrent.ConcurrentBag<AnalysisProgress>();
        var source = StudyReader.Open(new() { Images = folder.Images(4, [3, 3, 3]) });
        StudyReader.Read(source, source.Readable, Nothing, 2, new Direct(seen.Add)).Dispose();
        Assert.Equal([1, 2, 3, 4], seen.Select(p => p.Done).Order());
        Assert.All(seen, p => Assert.Equal(("reading images", 4), (p.Stage, p.Total)));
    }

    [Fact]
    public void Reading_can_be_stopped()
    {
        var source = StudyReader.Open(new() { Images = folder.Images(4, [3, 3, 3]) });
        Assert.Throws<OperationCanceledException>(() => StudyReader.Read(source, source.Readable, Nothing, 2, null, new CancellationToken(canceled: true)));
    }

    [Fact]
    public void All_damaged_files_are_named_at_once()
    {
        string[] paths = [.. Folder.Values(4, 512).Select((v, i) => folder.Image($"{i}.nii.gz", [8, 8, 8], v))];
        foreach (string path in new[] { paths[1], paths[3] }) File.WriteAllBytes(path, File.ReadAllBytes(path)[..^100]);
        Says(Fault(() => Read(new() { Images = paths })), paths[1], paths[3]);
    }

    [Theory]
    [InlineData(NiftiType.UInt8, 1, 0, false)]
    [InlineData(NiftiType.Int16, 1, 0, false)]
    [InlineData(NiftiType.Int16, 0.1, 3, true)]
    [InlineData(NiftiType.Float64, 1, 0, true)]
    [InlineData(NiftiType.Int32, 1, 0, true)]
    public void Only_values_beyond_single_precision_get_second_parts(NiftiType type, double slope, double intercept, bool second) =>
        Assert.Equal(!second, ImageLoader.IsExact(NiftiFile.For([2, 2, 2], Folder.Affine(), type) with { Slope = slope, Intercept = intercept }));

    [Fact]
    public void Scaled_integers_arrive_exactly()
    {
        double[][] values = Folder.Values(3, 27);
        string[] paths = [.. values.Select((v, i) => folder.In($"{i}.nii"))];
        for (int i = 0; i < 3; i++)
            NiftiFile.Write(paths[i], NiftiFile.For([3, 3, 3], Folder.Affine(), NiftiType.Int16) with { Slope = 0.1f, Intercept = 3 }, [.. values[i].Select(v => v * (double)0.1f + 3)]);
        using var study = Read(new() { Images = paths });
        for (int v = 0; v < 27; v++)
            for (int i = 0; i < 3; i++) Assert.Equal(values[i][v] * (double)0.1f + 3, study.Data[i, v], 1e-13);
    }

    [Theory]
    [InlineData(1e-40)]
    [InlineData(1e37)]
    public void Images_beyond_single_range_ask_for_another_unit(double unit)
    {
        string[] paths = folder.Images(3, [4, 4, 4], all => { Scale([all[0]], unit); Scale([all[2]], unit); all[1][3] = double.NaN; }, NiftiType.Float64);
        string message = Fault(() => Read(new() { Images = paths }));
        Assert.Equal(2, message.Split('\n').Length);
        Says(message, paths[0], paths[2], "unit");
    }

    [Fact]
    public void One_image_is_not_enough()
    {
        var source = StudyReader.Open(new() { Images = folder.Images(3, [3, 3, 3]) });
        Says(Fault(() => StudyReader.Read(source, [1], Nothing)), "1 image left", "at least 2");
    }

    private string MaskOf(int voxels, Func<int, double> value, long[] size) =>
        folder.Image("mask.nii", size, [.. Enumerable.Range(0, voxels).Select(value)]);

    private static void Scale(double[][] all, double by)
    {
        foreach (double[] image in all)
            for (int v = 0; v < image.Length; v++) image[v] *= by;
    }

    private sealed class Direct(Action<AnalysisProgress> seen) : IProgress<AnalysisProgress>
    {
        public void Report(AnalysisProgress value) => seen(value);
    }
}
