using Campaigns.Catalog.Exporting;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Exporting;

public sealed class NewFolderTests : IDisposable
{
    private const int NoSpace = 28;
    private const int DiskFullWindows = 112;

    private readonly TestFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void A_folder_appears_whole_or_not_at_all()
    {
        NewFolder.Write(_folder["out"], draft =>
        {
            Assert.False(Directory.Exists(_folder["out"]));
            File.WriteAllText(Path.Combine(draft, "a.csv"), "a");
        });
        Assert.Equal("a", File.ReadAllText(Path.Combine(_folder["out"], "a.csv")));
        Assert.Equal(["out"], _folder.Files);
    }

    [Fact]
    public void What_goes_wrong_is_told_by_the_name_that_was_asked_for_and_leaves_nothing()
    {
        RefusedException refused = Assert.Throws<RefusedException>(() => NewFolder.Write(_folder["out"], draft => File.ReadAllText(Path.Combine(draft, "not there"))));
        Assert.Contains(_folder["out"], refused.Message, StringComparison.Ordinal);
        Assert.Contains("not there", refused.Message, StringComparison.Ordinal);
        Assert.DoesNotContain(".new-", refused.Message, StringComparison.Ordinal);
        Assert.EndsWith("Nothing was written.", refused.Message, StringComparison.Ordinal);
        Assert.Empty(_folder.Files);
    }

    [Fact]
    public void A_full_disk_is_said_in_words_and_leaves_nothing()
    {
        RefusedException refused = Assert.Throws<RefusedException>(() => NewFolder.Write(_folder["out"], draft =>
        {
            File.WriteAllText(Path.Combine(draft, "half.csv"), "half");
            throw new IOException($"No space left on device : '{draft}'", OperatingSystem.IsWindows() ? unchecked((int)0x80070000) | DiskFullWindows : NoSpace);
        }));
        Assert.Equal($"The folder '{_folder["out"]}' cannot be written: the disk is full; make room and try again. Nothing was written.", refused.Message);
        Assert.Empty(_folder.Files);
    }

    [Fact]
    public void A_device_that_is_full_is_a_full_disk()
    {
        const string full = "/dev/full";
        Assert.SkipUnless(File.Exists(full), "This system has no device that is always full.");
        RefusedException refused = Assert.Throws<RefusedException>(() => NewFolder.Write(_folder["out"], _ =>
        {
            using FileStream device = new(full, FileMode.Open, FileAccess.Write);
            device.Write(new byte[1 << 16]);
        }));
        Assert.Contains("the disk is full", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void What_is_there_is_not_written_over()
    {
        Directory.CreateDirectory(_folder["out"]);
        File.WriteAllText(Path.Combine(_folder["out"], "mine.csv"), "mine");
        Assert.Contains("is not an empty folder", Assert.Throws<RefusedException>(() => NewFolder.Write(_folder["out"], _ => Assert.Fail("asked to write"))).Message, StringComparison.Ordinal);
        Assert.Equal("mine", File.ReadAllText(Path.Combine(_folder["out"], "mine.csv")));
    }
}
