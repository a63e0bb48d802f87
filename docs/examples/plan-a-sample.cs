#!/usr/bin/env dotnet
// How many measurements does the wanted precision take? Asked before measuring, so all numbers rest on an INVENTED guess of the shape.
//   dotnet run docs/examples/plan-a-sample.cs
#:project ../../src/Smoothing/Smoothing.csproj

using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Theory;

// The guess: coating thickness around 80 µm, every tenth part from a second line around 95 µm.
var guess = new NormalMixture([0.9, 0.1], [80, 95], [4, 3]);
var theory = new ErrorTheory(Kernel.Gaussian, guess);

Console.WriteLine("Guess: 90 % around 80 µm, 10 % around 95 µm (invented).\n");

Console.WriteLine("1. A share near 10 % to within 2 percentage points, 95 % interval:");
Console.WriteLine(FormattableString.Invariant($"   {Shares.SampleSizeFor(0.1, 0.02):N0} parts\n"));

Console.WriteLine("2. An interval for the 99th percentile that ends on both sides:");
Console.WriteLine(FormattableString.Invariant($"   {Quantiles.SampleSizeForFiniteInterval(0.99):N0} parts\n"));

Console.WriteLine("3. The height of the curve at the small peak, root mean squared error relative to it:");
foreach (double error in new[] { 0.2, 0.1, 0.05 })
{
    long n = theory.SampleSizeFor(95, error);
    Console.WriteLine(FormattableString.Invariant($"   ±{100 * error:F0} %: {n,8:N0} parts, with h = {theory.OptimalBandwidthAt(95, n):F2} µm"));
}

Console.WriteLine("\n4. What a budget buys for the whole curve:");
foreach (long n in new[] { 100L, 400, 1600 })
{
    double h = theory.OptimalBandwidth(n);
    double mise = theory.Mise(h, n);
    Console.WriteLine(FormattableString.Invariant($"   {n,5:N0} parts: best h = {h:F2} µm, {100 * theory.IntegratedSquaredBias(h) / mise:F0} % of the error is bias, error {Math.Sqrt(mise / theory.Mise(theory.OptimalBandwidth(100), 100)):F2} times that of 100 parts"));
}

Console.WriteLine("\nA plan is as good as its guess: look at the first hundred values and plan again.");
