using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Permute.Engine;

/// <summary>
/// The few vector operations the kernels need, at one width. The kernels are written once over this and compiled apart for every width; only additions,
/// subtractions, products, quotients and comparisons of single lanes occur, each rounded by itself, so every width gives the same bits.
/// </summary>
/// <typeparam name="TVector">A vector of <see cref="Count"/> floats.</typeparam>
internal unsafe interface ILanes<TVector> where TVector : struct
{
    /// <summary>Floats in a vector.</summary>
    static abstract int Count { get; }

    static abstract TVector Load(float* from);

    static abstract void Store(TVector value, float* to);

    static abstract TVector All(float value);

    static abstract TVector Add(TVector a, TVector b);

    static abstract TVector Subtract(TVector a, TVector b);

    static abstract TVector Multiply(TVector a, TVector b);

    static abstract TVector Divide(TVector a, TVector b);

    static abstract TVector Max(TVector a, TVector b);

    static abstract TVector Min(TVector a, TVector b);

    static abstract TVector Abs(TVector a);

    /// <summary>1 in the lanes where <paramref name="a"/> is strictly above <paramref name="b"/>, else 0.</summary>
    static abstract TVector OneWhereAbove(TVector a, TVector b);

    /// <summary>Bit i set where lane i of <paramref name="a"/> is strictly above that of <paramref name="b"/>.</summary>
    static abstract ulong Above(TVector a, TVector b);

    /// <summary>Bit i set where lane i is negative (or −0).</summary>
    static abstract ulong Negative(TVector a);
}

/// <summary>512 bits, where AVX-512 is there.</summary>
internal readonly unsafe struct Lanes512 : ILanes<Vector512<float>>
{
    public static int Count => 16;

    public static Vector512<float> Load(float* from) => Vector512.Load(from);

    public static void Store(Vector512<float> value, float* to) => value.Store(to);

    public static Vector512<float> All(float value) => Vector512.Create(value);

    public static Vector512<float> Add(Vector512<float> a, Vector512<float> b) => a + b;

    public static Vector512<float> Subtract(Vector512<float> a, Vector512<float> b) => a - b;

    public static Vector512<float> Multiply(Vector512<float> a, Vector512<float> b) => a * b;

    public static Vector512<float> Divide(Vector512<float> a, Vector512<float> b) => a / b;

    public static Vector512<float> Max(Vector512<float> a, Vector512<float> b) => Vector512.MaxNative(a, b);

    public static Vector512<float> Min(Vector512<float> a, Vector512<float> b) => Vector512.MinNative(a, b);

    public static Vector512<float> OneWhereAbove(Vector512<float> a, Vector512<float> b) => Vector512.GreaterThan(a, b) & Vector512<float>.One;

    public static Vector512<float> Abs(Vector512<float> a) => Vector512.Abs(a);

    public static ulong Above(Vector512<float> a, Vector512<float> b) => Vector512.GreaterThan(a, b).ExtractMostSignificantBits();

    public static ulong Negative(Vector512<float> a) => a.ExtractMostSignificantBits();
}

/// <summary>256 bits, where AVX2 is there.</summary>
internal readonly unsafe struct Lanes256 : ILanes<Vector256<float>>
{
    public static int Count => 8;

    public static Vector256<float> Load(float* from) => Vector256.Load(from);

    public static void Store(Vector256<float> value, float* to) => value.Store(to);

    public static Vector256<float> All(float value) => Vector256.Create(value);

    public static Vector256<float> Add(Vector256<float> a, Vector256<float> b) => a + b;

    public static Vector256<float> Subtract(Vector256<float> a, Vector256<float> b) => a - b;

    public static Vector256<float> Multiply(Vector256<float> a, Vector256<float> b) => a * b;

    public static Vector256<float> Divide(Vector256<float> a, Vector256<float> b) => a / b;

    public static Vector256<float> Max(Vector256<float> a, Vector256<float> b) => Vector256.MaxNative(a, b);

    public static Vector256<float> Min(Vector256<float> a, Vector256<float> b) => Vector256.MinNative(a, b);

    public static Vector256<float> OneWhereAbove(Vector256<float> a, Vector256<float> b) => Vector256.GreaterThan(a, b) & Vector256<float>.One;

    public static Vector256<float> Abs(Vector256<float> a) => Vector256.Abs(a);

    public static ulong Above(Vector256<float> a, Vector256<float> b) => Vector256.GreaterThan(a, b).ExtractMostSignificantBits();

    public static ulong Negative(Vector256<float> a) => a.ExtractMostSignificantBits();
}

/// <summary>128 bits: every x64 and Arm64 processor.</summary>
internal readonly unsafe struct Lanes128 : ILanes<Vector128<float>>
{
    public static int Count => 4;

    public static Vector128<float> Load(float* from) => Vector128.Load(from);

    public static void Store(Vector128<float> value, float* to) => value.Store(to);

    public static Vector128<float> All(float value) => Vector128.Create(value);

    public static Vector128<float> Add(Vector128<float> a, Vector128<float> b) => a + b;

    public static Vector128<float> Subtract(Vector128<float> a, Vector128<float> b) => a - b;

    public static Vector128<float> Multiply(Vector128<float> a, Vector128<float> b) => a * b;

    public static Vector128<float> Divide(Vector128<float> a, Vector128<float> b) => a / b;

    public static Vector128<float> Max(Vector128<float> a, Vector128<float> b) => Vector128.MaxNative(a, b);

    public static Vector128<float> Min(Vector128<float> a, Vector128<float> b) => Vector128.MinNative(a, b);

    public static Vector128<float> OneWhereAbove(Vector128<float> a, Vector128<float> b) => Vector128.GreaterThan(a, b) & Vector128<float>.One;

    public static Vector128<float> Abs(Vector128<float> a) => Vector128.Abs(a);

    public static ulong Above(Vector128<float> a, Vector128<float> b) => Vector128.GreaterThan(a, b).ExtractMostSignificantBits();

    public static ulong Negative(Vector128<float> a) => a.ExtractMostSignificantBits();
}

/// <summary>One float at a time: the kernels as plain scalar code, and the fallback without any intrinsics.</summary>
internal readonly unsafe struct LanesScalar : ILanes<float>
{
    public static int Count => 1;

    public static float Load(float* from) => *from;

    public static void Store(float value, float* to) => *to = value;

    public static float All(float value) => value;

    public static float Add(float a, float b) => a + b;

    public static float Subtract(float a, float b) => a - b;

    public static float Multiply(float a, float b) => a * b;

    public static float Divide(float a, float b) => a / b;

    public static float Max(float a, float b) => a > b ? a : b;

    public static float Min(float a, float b) => a < b ? a : b;

    public static float OneWhereAbove(float a, float b) => a > b ? 1 : 0;

    public static float Abs(float a) => MathF.Abs(a);

    public static ulong Above(float a, float b) => a > b ? 1UL : 0;

    public static ulong Negative(float a) => BitConverter.SingleToUInt32Bits(a) >> 31;
}

/// <summary>An instruction set the kernels can run on.</summary>
public enum InstructionSet
{
    /// <summary>Plain scalar code.</summary>
    Scalar,

    /// <summary>128-bit vectors.</summary>
    Vector128,

    /// <summary>256-bit vectors (AVX2).</summary>
    Vector256,

    /// <summary>512-bit vectors (AVX-512).</summary>
    Vector512,
}

/// <summary>Which instruction sets this machine has.</summary>
public static class InstructionSets
{
    /// <summary>The widest one supported.</summary>
    public static InstructionSet Best => Supported[^1];

    /// <summary>All that are supported, narrowest first.</summary>
    public static IReadOnlyList<InstructionSet> Supported { get; } =
    [
        InstructionSet.Scalar,
        .. Vector128.IsHardwareAccelerated ? new[] { InstructionSet.Vector128 } : [],
        .. Avx2.IsSupported ? new[] { InstructionSet.Vector256 } : [],
        .. Vector512.IsHardwareAccelerated && Avx512F.IsSupported ? new[] { InstructionSet.Vector512 } : [],
    ];
}
