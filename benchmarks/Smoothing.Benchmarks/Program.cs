using BenchmarkDotNet.Running;

// Without a known first argument the BenchmarkDotNet classes are offered; with one, a table of the project is printed.
string command = args.Length > 0 ? args[0] : "";
switch (command)
{
    case "samples": return Smoothing.Benchmarks.Samples.SampleBench.Run(args[1..]);
    case "targets": return Smoothing.Benchmarks.Targets.TargetTable.Run(args[1..]);
    case Smoothing.Benchmarks.Targets.FirstCall.Command: return Smoothing.Benchmarks.Targets.FirstCall.Run(args[1..]);
    case "soak": return Smoothing.Benchmarks.Soak.SoakRun.Run(args[1..]);
    case "api": return Smoothing.Benchmarks.Api.ApiPages.Run();
    case "accuracy": return Smoothing.Benchmarks.Accuracy.AccuracyDocument.Run(args[1..]);
    case "limits": return Smoothing.Benchmarks.Estimation.LimitsBench.Run(args[1..]);
    case "selectors": return Smoothing.Benchmarks.SelectorsBench.Run(args[1..]);
    case "sql": return Smoothing.Benchmarks.Sql.SqlBench.Run(args[1..]);
    case "theory": return Smoothing.Benchmarks.Theory.TheoryDocument.Run();
    case "kernels": return Smoothing.Benchmarks.Kernels.KernelsDocument.Run();
    default:
        BenchmarkSwitcher.FromAssembly(typeof(Program).Assembly).Run(args);
        return 0;
}
