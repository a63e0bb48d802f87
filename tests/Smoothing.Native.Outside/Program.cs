using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Microsoft.Data.Sqlite;
using Smoothing;
using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Sql;
using Smoothing.Theory;

// Prints what each part of the library computes. The check runs it under the just-in-time compiler and as a native program and compares:
// words must be the same, numbers to 1e-7 (minima found by values hold half the digits; vector widths differ between the two).
NormalMixture target = NormalMixture.MarronWand[5];
double[] values = target.Draw(2_000, 7);

foreach (Kernel kernel in Kernel.Standard)
{
    Density density = Density.Of(Sample.Of(values), kernel, 0.4);
    Print($"kernel {kernel.Name}", density.Value(0.5), density.Cumulative(0.5), density.Quantile(0.9));
}

Density limited = Density.Of(Sample.Of(values.Select(Math.Abs).ToArray()), Kernel.Gaussian, 0.3, new DensityOptions { Support = new Interval(0, double.PositiveInfinity) });
Print("limited", limited.Value(0), limited.Cumulative(1), limited.Derivative(0.2));

foreach (BandwidthRule rule in Enum.GetValues<BandwidthRule>())
{
    Print($"rule {rule}", DensityStudy.Of(values, new StudyOptions { Rule = rule }).Bandwidth.Value);
}

Print("theory", new ErrorTheory(Kernel.Gaussian, target).OptimalBandwidth(1_000), new ErrorTheory(Kernel.Epanechnikov, target).Mise(0.3, 1_000));
GroupEvidence groups = Groups.Of(Sample.Of(values), 3);
ComparisonResult comparison = Comparison.Of(Sample.Of(values[..1_000]), Sample.Of(values[1_000..]), 5);
Print("groups", groups.AtLeast, groups.Dip, groups.DipPValue);
Print("comparison", comparison.PValue);

DensityStudy study = DensityStudy.Of(values, new StudyOptions { Name = "level", Unit = "mm", Limits = [1.5], ReferenceValues = values.AsMemory(0, values.Length / 3), ReferenceName = "the first third" });
Print("band", study.Band!.Lower[200], study.Band.Upper[200], study.Band.CriticalValue);
Text("text", study.ToText());
Text("markdown", study.ToMarkdown());
Text("html", study.ToHtml());
Console.WriteLine(StudyDocument.FromJson(study.ToJson()).ToJson());

using var connection = new SqliteConnection("Data Source=:memory:");
connection.Open();
using (SqliteCommand command = connection.CreateCommand())
{
    command.CommandText = "create table stays (minutes real)";
    command.ExecuteNonQuery();
    command.CommandText = "insert into stays values ($v)";
    SqliteParameter parameter = command.Parameters.Add("$v", SqliteType.Real);
    using SqliteTransaction transaction = connection.BeginTransaction();
    command.Transaction = transaction;
    foreach (double value in values)
    {
        parameter.Value = value;
        command.ExecuteNonQuery();
    }

    transaction.Commit();
}

CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "stays", Value = "minutes" });
Print("table", Density.Of(column.Sample, Kernel.Gaussian, 0.4).Value(0.5));
return 0;

static void Print(string name, params ReadOnlySpan<double> numbers)
{
    var line = new StringBuilder(name);
    foreach (double number in numbers)
    {
        line.Append(CultureInfo.InvariantCulture, $" {number:R}");
    }

    Console.WriteLine(line);
}

static void Text(string name, string text) => Console.WriteLine($"{name} {text.Length} {Convert.ToHexString(SHA256.HashData(Encoding.UTF8.GetBytes(text)))[..16]}");
