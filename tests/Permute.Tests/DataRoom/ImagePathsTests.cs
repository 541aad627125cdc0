using Permute.Data;

namespace Permute.Tests.DataRoom;

public sealed class ImagePathsTests : IDisposable
{
    private readonly Folder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void A_pattern_gives_its_files_in_ordinal_order()
    {
        foreach (string name in new[] { "s10.nii", "s2.nii", "S1.nii", "s1.nii", "s1.txt", ".s0.nii" }) folder.Text(name, "");
        Assert.Equal(["S1.nii", "s1.nii", "s10.nii", "s2.nii"], Names("*.nii"));
        Assert.Equal(["s1.nii", "s2.nii"], Names("s?.nii"));
    }

    [Fact]
    public void Wildcards_may_stand_in_folders_too()
    {
        foreach (string name in new[] { "sub-2/con.nii.gz", "sub-1/con.nii.gz", "sub-1/mask.nii.gz", "other/con.nii.gz", "sub-3/x/con.nii.gz" }) folder.Text(name, "");
        Assert.Equal(["sub-1/con.nii.gz", "sub-2/con.nii.gz"], Names("sub-*/con.nii.gz"));
        Assert.Equal(["sub-3/x/con.nii.gz"], Names("sub-*/x/c*"));
    }

    [Fact]
    public void A_pattern_without_files_gives_none()
    {
        Assert.Empty(Names("*.nii"));
        Assert.Empty(Names("none/*.nii"));
    }

    [Fact]
    public void A_name_without_wildcards_or_of_an_existing_file_is_itself()
    {
        Assert.Equal(["plain.nii"], ImagePaths.Resolve("plain.nii"));
        folder.Text("what?.nii", "");
        folder.Text("whats.nii", "");
        Assert.Equal(["what?.nii"], Names("what?.nii"));
    }

    [Fact]
    public void Names_are_as_short_as_tells_the_files_apart()
    {
        Assert.Equal(["a.nii", "b.nii"], ImagePaths.ShortNames(["/d/s1/a.nii", "/d/s1/b.nii"]));
        Assert.Equal(["s1/a.nii", "s2/a.nii"], ImagePaths.ShortNames(["/d/s1/a.nii", "/d/s2/a.nii"]));
        Assert.Equal(["s1/x/a.nii", "s2/x/a.nii"], ImagePaths.ShortNames(["/d/s1/x/a.nii", "/d/s2/x/a.nii"]));
    }

    [Fact]
    public void The_two_halves_of_a_pair_are_one_image()
    {
        Assert.Equal(ImagePaths.Key("/d/a.hdr"), ImagePaths.Key("/d/../d/a.img"));
        Assert.Equal(ImagePaths.Key("/d/a.hdr"), ImagePaths.Key("/d/a.img.gz"));
        Assert.NotEqual(ImagePaths.Key("/d/a.nii"), ImagePaths.Key("/d/a.nii.gz"));
    }

    [Fact]
    public void Both_halves_of_a_pair_are_hashed()
    {
        folder.Text("a.hdr", "header");
        folder.Text("a.img.gz", "voxels");
        Assert.Equal(["data/a.hdr", "data/a.img.gz"], FileHash.Of("data/a.hdr", folder.In("a.hdr")).Keys.Order(StringComparer.Ordinal));
        // Published SHA-256 example: FIPS 180-4, "abc".
        Assert.Equal("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad", FileHash.Of("x", folder.Text("x", "abc"))["x"]);
    }

    private string[] Names(string pattern) => [.. ImagePaths.Resolve(folder.In(pattern)).Select(p => Path.GetRelativePath(folder.Path, p))];
}
