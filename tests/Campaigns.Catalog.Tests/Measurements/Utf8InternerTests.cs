using System.Text;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Tests.Measurements;

public sealed class Utf8InternerTests
{
    [Fact]
    public void Numbers_agree_with_a_dictionary_of_strings()
    {
        var random = new Random(20261201);
        var interner = new Utf8Interner();
        for (int round = 0; round < 5; round++)
        {
            var known = new Dictionary<string, int>(StringComparer.Ordinal);
            for (int i = 0; i < 20_000; i++)
            {
                string text = Text(random);
                byte[] bytes = Encoding.UTF8.GetBytes(text);
                Assert.Equal(known.GetValueOrDefault(text, -1), interner.Find(bytes));
                known.TryAdd(text, known.Count);
                Assert.Equal(known[text], interner.Intern(bytes));
            }

            Assert.Equal(known.Count, interner.Count);
            Assert.All(known, pair => Assert.Equal(pair.Key, interner.Text(pair.Value)));
            interner.Clear();
            Assert.Equal(0, interner.Count);
            Assert.All(known.Keys.Take(100), text => Assert.Equal(-1, interner.Find(Encoding.UTF8.GetBytes(text))));
        }
    }

    /// <summary>Short texts repeat often; long ones share their beginnings, so that every byte counts.</summary>
    private static string Text(Random random) => random.Next(4) switch
    {
        0 => new string((char)('a' + random.Next(3)), random.Next(4)),
        1 => FormattableString.Invariant($"GS-{random.Next(3000):D5}"),
        2 => "the same beginning of a long label " + new string('x', random.Next(20)) + random.Next(2),
        _ => $"µ° {(char)random.Next(0x3b1, 0x3c9)} {random.Next(500)}",
    };
}
