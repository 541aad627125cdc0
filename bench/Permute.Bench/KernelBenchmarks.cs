using System.Runtime.InteropServices;
using BenchmarkDotNet.Attributes;
using Permute.Data;
using Permute.Design;
using Permute.Engine;

namespace Permute.Bench;

/// <summary>One thread, one block of 64 voxels, 20 images, 4,096 sign flips: the subset-sum kernel of each instruction set beside a plain dense product. One operation is
/// one voxel under one relabeling.</summary>
[MemoryDiagnoser]
public unsafe class KernelBenchmarks : IDisposable
{
    private const int Images = 20, Count = 4096;
    private readonly GroupPlan plan = new(Images);
    private Work? work;
    private PackedData? packed;
    private SignTile? tile;
    private IBlockKernel? sums;
    private float* floor;
    private int* places;
    private ulong* words;

    /// <summary>The instruction set of the subset-sum kernels.</summary>
    [ParamsSource(nameof(Sets))]
    public InstructionSet Set { get; set; }

    /// <summary>What this machine has.</summary>
    public static IEnumerable<InstructionSet> Sets => InstructionSets.Supported;

    /// <summary>Makes the data.</summary>
    [GlobalSetup]
    public void Setup()
    {
        work = new Work(Images, 2000);
        packed = new PackedData(work.Data, work.Model);
        var order = new RelabelingPlan(work.Model.Relabelings, Count, 1);
        var (rows, signs) = (new int[Count * Images], new sbyte[Count * Images]);
        for (int k = 0; k < Count; k++) order.Arrange(k, rows.AsSpan(k * Images, Images), signs.AsSpan(k * Images, Images));
        tile = new SignTile(plan, work.Model.Codes!, 0, Count, rows, signs);
        sums = SubsetSums.Create(plan, Set);
        sums.Take(tile);
        floor = (float*)NativeMemory.AlignedAlloc(Count * sizeof(float), 64);
        new Span<float>(floor, Count).Fill(4.4f);
        places = (int*)NativeMemory.AlignedAlloc((Count + 1) * sizeof(int), 64);
        words = (ulong*)NativeMemory.AlignedAlloc(6 * Count * sizeof(ulong), 64);
    }

    /// <summary>Frees it.</summary>
    [GlobalCleanup]
    public void Dispose()
    {
        sums?.Dispose();
        packed?.Dispose();
        work?.Dispose();
        GC.SuppressFinalize(this);
        NativeMemory.AlignedFree(floor);
        NativeMemory.AlignedFree(places);
        NativeMemory.AlignedFree(words);
    }

    /// <summary>Multiply and add, voxel by voxel: the product S·U with the maximum taken on the way.</summary>
    [Benchmark(Baseline = true, OperationsPerInvoke = Count * SubjectMatrix.Lanes)]
    public float Dense()
    {
        float best = 0;
        float* u = packed!.Block(3);
        for (int k = 0; k < Count; k++)
        {
            ReadOnlySpan<sbyte> s = tile!.SignsAt(k);
            for (int lane = 0; lane < SubjectMatrix.Lanes; lane += System.Numerics.Vector<float>.Count)
            {
                var sum = System.Numerics.Vector<float>.Zero;
                for (int i = 0; i < Images; i++) sum += new System.Numerics.Vector<float>(s[i]) * *(System.Numerics.Vector<float>*)(u + i * SubjectMatrix.Lanes + lane);
                for (int j = 0; j < System.Numerics.Vector<float>.Count; j++) best = MathF.Max(best, sum[j]);
            }
        }
        return best;
    }

    /// <summary>The largest sum of every relabeling.</summary>
    [Benchmark(OperationsPerInvoke = Count * SubjectMatrix.Lanes)]
    public int Height() => Each(both: false, []);

    /// <summary>The same in both directions.</summary>
    [Benchmark(OperationsPerInvoke = Count * SubjectMatrix.Lanes)]
    public int HeightBoth() => Each(both: true, []);

    /// <summary>With the bits of one forming threshold.</summary>
    [Benchmark(OperationsPerInvoke = Count * SubjectMatrix.Lanes)]
    public int OneThreshold() => Each(both: false, [2.2f]);

    /// <summary>With the bits of five.</summary>
    [Benchmark(OperationsPerInvoke = Count * SubjectMatrix.Lanes)]
    public int FiveThresholds() => Each(both: false, [1.7f, 2.0f, 2.2f, 2.5f, 2.9f]);

    private int Each(bool both, ReadOnlySpan<float> limits)
    {
        int found = 0;
        IBlockKernel sums = this.sums!;
        for (int c = 0; c < SubjectMatrix.Lanes; c += sums.Width)
        {
            sums.Open(packed!.Block(3) + c);
            found += limits.Length == 0
                ? sums.AboveFloor(both, floor, places)
                : sums.AboveFloorAndLimits(both, floor, places, limits, words, Count, c);
        }
        return found;
    }
}
