using System.Text;
using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Tests.Loading;

/// <summary>The forms in which laboratories write files, each with the exact outcome: values, or the code of the refusal with line and column.</summary>
public sealed class MeasurementFileFormsTests
{
    private const string Two = "E1/A=1.5 E1/B=2";

    [Theory]
    [InlineData("experiment,group,value\nE1,A,1.5\nE1,B,2\n", Two)]
    [InlineData("experiment,group,value\r\nE1,A,1.5\r\nE1,B,2\r\n", Two)]
    [InlineData("experiment,group,value\rE1,A,1.5\rE1,B,2\r", Two)]
    [InlineData("experiment,group,value\r\nE1,A,1.5\nE1,B,2\r", Two)]
    [InlineData("experiment,group,value\nE1,A,1.5\nE1,B,2", Two)]
    [InlineData("experiment;group;value\nE1;A;1.5\nE1;B;2\n", Two)]
    [InlineData("experiment\tgroup\tvalue\nE1\tA\t1.5\nE1\tB\t2\n", Two)]
    [InlineData("sep=;\nexperiment;group;value\nE1;A;1.5\nE1;B;2\n", Two)]
    [InlineData("sep=;\r\nexperiment;group;value\r\nE1;A;x\r\n", "not-a-number@3:value")]
    [InlineData("value,GROUP, Experiment \n1.5,A,E1\n2,B,E1\n", Two)]
    [InlineData("\n\r\nexperiment,group,value\n\nE1,A,1.5\n\n\nE1,B,2\n\n", Two)]
    [InlineData("experiment,group,value\n,,\nE1,A,1.5\n , ,\t\nE1,B,2\n,,\n", Two)]
    [InlineData("experiment,group,value\n E1 ,\tA,  1.5 \nE1,B ,2\n", Two)]
    [InlineData("\"experiment\",\"group\",\"value\"\n\"E1\",\"A\",\"1.5\"\n\"E1\",\"B\",\"2\"\n", Two)]
    [InlineData("experiment,group,value,\nE1,A,1.5,\nE1,B,2,\n", Two)]
    [InlineData("experiment;group;value;note\nE1;A;1.5;fresh, cold\nE1;B;2;\n", Two)]
    [InlineData("experiment;group;value (a,b,c,d)\nE1;A;1\n", "missing-column@1:value")]
    [InlineData("experiment,group,value\nE1,\"A, thin\",1.5\n", "E1/A, thin=1.5")]
    [InlineData("experiment,group,value\nE1,\"A \"\"x\"\"\",1.5\n", "E1/A \"x\"=1.5")]
    [InlineData("experiment,group,value\nE1,A,NA\nE1,B,\nE1,C,n/a\n", "E1/A=NA E1/B=NA E1/C=NA")]
    [InlineData("experiment,group,value,specimen,block,order\nE1,A,1,P7,day 1,12\nE1,A,2,NA,,\n", "E1/A/sP7/bday 1/o12=1 E1/A=2")]
    [InlineData("order,block,specimen,value,group,experiment\n-3,b,s,1e2,A,E1\n", "E1/A/ss/bb/o-3=1E2")]
    [InlineData("experiment,group,value\nE1,Größe,1\n", "E1/Größe=1")]
    [InlineData("experiment,group,value\nE1,\u8A66\u6599,1\n", "E1/\u8A66\u6599=1")]
    [InlineData("experiment,group,value\nE1,\uD83E\uDDEA,1\n", "E1/\uD83E\uDDEA=1")]
    [InlineData("experiment,group,value\nE1,Gro\u0308\u00DFe,1\n", "E1/Größe=1")]
    [InlineData("experiment,group,value\nE1,\u00A0B\u00A0,1\n", "E1/B=1")]
    [InlineData("experiment,group,value\nE1,A,\u22121.5\n", "E1/A=-1.5")]
    [InlineData("experiment,group,value,note\nE1,A,1.5,\"two\nlines\"\nE1,B,x,\n", "E1/A=1.5 not-a-number@4:value")]
    [InlineData("", "empty-file@0")]
    [InlineData("\n\n", "no-rows@0")]
    [InlineData("experiment,group,value", "no-rows@0")]
    [InlineData("experiment,group,value\n\n,,\n", "no-rows@0")]
    [InlineData("E1,A,1.5\nE1,B,2\n", "missing-column@1:experiment missing-column@1:group missing-column@1:value")]
    [InlineData("experiment,group,reading\nE1,A,1.5\n", "missing-column@1:value")]
    [InlineData("\n\nexperiment,group\nE1,A\n", "missing-column@3:value")]
    [InlineData("experiment,group,value,VALUE\nE1,A,1,2\n", "duplicate-column@1:value")]
    [InlineData("experiment,group,value,block,Block\nE1,A,1,2,3\n", "duplicate-column@1:block")]
    [InlineData("experiment,group,value,note,note\nE1,A,1.5,x,y\nE1,B,2,x,y\n", Two)]
    [InlineData("experiment,group,value\nexperiment,group,value\nE1,A,1\n", "E1/A=1 not-a-number@2:value")]
    [InlineData("experiment,group,value\nE1,A\nE1,B,2\n", "E1/B=2 too-few-fields@2")]
    [InlineData("experiment,group,value\nE1,A,1,5\n", "too-many-fields@2")]
    [InlineData("experiment,group,value\nE1,A,1.5,\n", "too-many-fields@2")]
    [InlineData("experiment,group,value,\nE1,A,1.5\n", "too-few-fields@2")]
    [InlineData("experiment,group,value,\nE1,A,1.5,x\n", "too-many-fields@2")]
    [InlineData("experiment,group,value\nE1,A,1\n\"E1,B,2\nE1,C,3\n", "E1/A=1 open-quote@3")]
    [InlineData("experiment,group,value\nE1,A\"x,1\nE1,B,2\n", "E1/B=2 stray-quote@2")]
    [InlineData("experiment,group,value\n\"E1\"x,A,1\nE1,B,2\n", "E1/B=2 text-after-quote@2")]
    [InlineData("experiment,\"group,value\nE1,A,1\n", "open-quote@1")]
    [InlineData("experiment,gr\"oup,value\nE1,A,1\n", "stray-quote@1")]
    [InlineData("experiment,group,value\n,A,1\nE1, ,1\n", "empty-name@2:experiment empty-name@3:group")]
    [InlineData("experiment,group,value\nE1,\"A\nB\",1\n", "control-character@2:group")]
    [InlineData("experiment,group,value\nE1,\"\r\n\",1\n\u00A0,A,1\n", "empty-name@2:group empty-name@4:experiment")]
    [InlineData("experiment,group,value\nE1,A\u0007,1\n", "control-character@2:group")]
    [InlineData("experiment,group,value\nE1,A\u0085B,1\n", "control-character@2:group")]
    [InlineData("experiment,group,value\nE\u001B[2J,A,1\n", "control-character@2:experiment")]
    [InlineData("experiment,group,value,order\nE1,A,1,2.5\n", "not-an-integer@2:order")]
    [InlineData("experiment,group,value,order\nE1,A,x,first\n", "not-a-number@2:value not-an-integer@2:order")]
    [InlineData("experiment,group,value\nE1,A,1\0\nE1,B,2\n", "nul-byte@2")]
    [InlineData("experiment,group,value\nE1,A,1\nE1,\0,2\n", "E1/A=1 nul-byte@3")]
    [InlineData("PK\u0003\u0004rest", "not-text@0")]
    public void A_file_in_utf8_has_its_exact_outcome(string text, string expected)
    {
        byte[] plain = Encoding.UTF8.GetBytes(text);
        Assert.Equal(expected, Outcome.OfMeasurements(plain));
        if (text.Length > 0 && !text.StartsWith("PK", StringComparison.Ordinal))
        {
            Assert.Equal(expected, Outcome.OfMeasurements([0xEF, 0xBB, 0xBF, .. plain]));
            Assert.Equal(expected, Outcome.OfMeasurements([0xFF, 0xFE, .. Encoding.Unicode.GetBytes(text)]));
            Assert.Equal(expected, Outcome.OfMeasurements([0xFE, 0xFF, .. Encoding.BigEndianUnicode.GetBytes(text)]));
        }
    }

    [Theory]
    [InlineData("experiment;group;value\nE1;A;1,5\nE1;B;2\n", Two)]
    [InlineData("experiment,group,value\nE1,A,\"1,5\"\nE1,B,2\n", Two)]
    [InlineData("experiment;group;value\nE1;A;1.5\n", "decimal-point@2:value")]
    [InlineData("experiment;group;value\nE1;A;1.234,5\n", "thousands-separator@2:value")]
    [InlineData("experiment,group,value\nE1,A,1,5\n", "too-many-fields@2")]
    public void A_file_with_decimal_commas_has_its_exact_outcome(string text, string expected) =>
        Assert.Equal(expected, Outcome.OfMeasurements(Encoding.UTF8.GetBytes(text), new DelimitedFileOptions { DecimalMark = DecimalMark.Comma }));

    [Theory]
    [InlineData("value=Reading,group=Code", "experiment,Code,Reading\nE1,A,1.5\nE1,B,2\n", Two)]
    [InlineData("value=reading", "experiment,group,value,Reading\nE1,A,9,1.5\nE1,B,9,2\n", Two)]
    [InlineData("value=Größe", "experiment,group,Gro\u0308ße\nE1,A,1.5\nE1,B,2\n", Two)]
    [InlineData("block=Day", "experiment,group,value\nE1,A,1.5\n", "missing-column@1:block")]
    [InlineData("value=Viscosity", "experiment,group,value\nE1,A,1.5\n", "missing-column@1:value")]
    public void Headers_may_be_mapped(string map, string text, string expected) =>
        Assert.Equal(expected, Outcome.OfMeasurements(Encoding.UTF8.GetBytes(text), new DelimitedFileOptions { Columns = ColumnMap.Parse(map, MeasurementFile.ColumnNames) }));

    [Theory]
    [InlineData("value", "no pair")]
    [InlineData("=x", "no pair")]
    [InlineData("value=", "no pair")]
    [InlineData("", "no pair")]
    [InlineData("valeu=x", "did you mean value?")]
    [InlineData("value=x,Value=y", "repeats")]
    [InlineData("value=x,group=X", "repeats")]
    public void A_wrong_map_is_refused(string map, string expected) =>
        Assert.Contains(expected, Assert.Throws<LoadingException>(() => ColumnMap.Parse(map, MeasurementFile.ColumnNames)).Message, StringComparison.Ordinal);

    [Fact]
    public void A_separator_that_is_given_is_not_guessed()
    {
        byte[] text = "experiment;group;value\nE1;A;1\n"u8.ToArray();
        Assert.Equal("missing-column@1:experiment missing-column@1:group missing-column@1:value", Outcome.OfMeasurements(text, new DelimitedFileOptions { Separator = ',' }));
        Assert.Equal("E1/A=1", Outcome.OfMeasurements(text, new DelimitedFileOptions { Separator = ';' }));
        Assert.Throws<LoadingException>(() => Outcome.OfMeasurements(text, new DelimitedFileOptions { Separator = '|' }));
    }

    [Fact]
    public void Bytes_of_an_older_encoding_are_refused_at_their_line_after_the_rows_before()
    {
        byte[] text = Encoding.Latin1.GetBytes("experiment,group,value\nE1,A,1.5\nE1,B,2\nE1,Größe,3\nE1,C,4\n");
        Assert.Equal(Two + " not-utf8@4", Outcome.OfMeasurements(text));
    }

    [Theory]
    [InlineData(new byte[] { 0xC3 })]
    [InlineData(new byte[] { 0xE2, 0x82 })]
    [InlineData(new byte[] { 0xC0, 0x80 })]
    [InlineData(new byte[] { 0xED, 0xA0, 0x80 })]
    [InlineData(new byte[] { 0xF4, 0x90, 0x80, 0x80 })]
    [InlineData(new byte[] { 0xFF })]
    public void Invalid_utf8_is_refused_in_the_middle_and_at_the_end(byte[] bytes)
    {
        byte[] start = "experiment,group,value\nE1,A,1.5\nE1,B,2\n"u8.ToArray();
        Assert.Equal(Two + " not-utf8@4", Outcome.OfMeasurements([.. start, .. bytes]));
        Assert.Equal(Two + " not-utf8@4", Outcome.OfMeasurements([.. start, .. "E1,\""u8, .. bytes, .. "\",3\n"u8]));
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    public void Broken_utf16_is_refused(int isBig)
    {
        Encoding encoding = isBig == 1 ? Encoding.BigEndianUnicode : Encoding.Unicode;
        byte[] start = [.. encoding.GetPreamble(), .. encoding.GetBytes("experiment,group,value\nE1,A,1.5\nE1,B,2\nE1,")];
        byte[] half = isBig == 1 ? [0xD8, 0x00] : [0x00, 0xD8];
        Assert.Equal(Two + " not-utf16@4", Outcome.OfMeasurements([.. start, .. half, .. encoding.GetBytes("x,3\n")]));
        Assert.Equal(Two + " not-utf16@4", Outcome.OfMeasurements([.. start, .. half]));
        Assert.Equal(Two + " not-utf16@4", Outcome.OfMeasurements([.. start, (byte)'x']));
    }

    [Fact]
    public void Utf16_without_its_mark_is_refused()
    {
        Assert.Equal("utf16-without-mark@1", Outcome.OfMeasurements(Encoding.Unicode.GetBytes("experiment,group,value\nE1,A,1\n")));
        Assert.Equal("utf16-without-mark@1", Outcome.OfMeasurements(Encoding.BigEndianUnicode.GetBytes("experiment,group,value\nE1,A,1\n")));
    }

    [Theory]
    [InlineData(65_535)]
    [InlineData(65_536)]
    [InlineData(65_537)]
    [InlineData(131_072)]
    public void Characters_across_the_ends_of_buffers_stay_whole(int position)
    {
        foreach (string character in (string[])["ä", "\u20AC", "\uD83E\uDDEA"])
        {
            StringBuilder text = new("experiment,group,value\n");
            while (text.Length < position - 40)
            {
                text.Append("E1,A,1\n");
            }

            string fill = new('x', 1 + ((position - text.Length) % 20));
            text.Append("E2,").Append(fill);
            for (int i = 0; i < 40; i++)
            {
                text.Append(character);
            }

            text.Append(",2\n");
            string expected = $"E2/{fill}{string.Concat(Enumerable.Repeat(character, 40))}=2";
            Assert.EndsWith(expected, Outcome.OfMeasurements(Encoding.UTF8.GetBytes(text.ToString())), StringComparison.Ordinal);
            Assert.EndsWith(expected, Outcome.OfMeasurements([0xFF, 0xFE, .. Encoding.Unicode.GetBytes(text.ToString())]), StringComparison.Ordinal);
        }
    }
}
