#!/usr/bin/env python3
"""The relabeling job in NumPy and SciPy: what a careful user of general-purpose libraries gets.

r = S @ U for signs S (N x n) and unit-norm data U (n x V), single precision; per relabeling either
the largest r (height), the largest 18-neighbour component of r > R (extent), or the largest value of
threshold-free cluster enhancement, summed over heights 0.1, 0.2, ... of t (tfce). See README.md.
"""
import argparse
import ctypes
import json
import multiprocessing
import os
import sys
import time
from concurrent.futures import ThreadPoolExecutor

# (layout, relabelings, voxels, who threads); `choose` times them on the machine at hand. On a busy 2-core AVX2
# machine, CPU seconds per 10,000 relabelings of 20 images and 200,145 voxels, all threads, medians of 3: columns
# 1000x512 1.85, rows 64x2048 1.86, rows 128x2048 1.82; with OpenBLAS's own threads 2.18 and 2.44.
HEIGHT_WAYS = [
    ("columns", 1000, 512, "pool"), ("columns", 500, 512, "pool"), ("columns", 250, 1024, "pool"),
    ("rows", 64, 2048, "pool"), ("rows", 128, 2048, "pool"), ("rows", 1000, 1024, "pool"),
    ("columns", 1000, 1024, "blas"), ("rows", 64, 4096, "blas"),
]
EXTENT_WAYS = ["threads", "processes"]
EXTENT_CHUNK = 32  # relabelings per product: 0.21 ms each against 0.60 ms at 4


def best_kernel():
    """The OpenBLAS kernel family this processor can run; its own detection may know only older ones."""
    try:
        with open("/proc/cpuinfo") as f:
            flags = next((line.split() for line in f if line.startswith("flags")), [])
    except OSError:
        return None
    return "SkylakeX" if "avx512f" in flags else "Haswell" if "avx2" in flags else None


class Blas:
    """The OpenBLAS libraries loaded in this process, asked through their own functions."""

    NAMES = ["openblas_{}", "openblas_{}64_", "scipy_openblas_{}", "scipy_openblas_{}64_"]

    def __init__(self):
        with open("/proc/self/maps") as f:
            paths = sorted({line.split()[-1] for line in f if "blas" in line.split()[-1]})
        self.found = []
        for path in paths:
            library = ctypes.CDLL(path)
            name = next((p for p in self.NAMES if hasattr(library, p.format("get_corename"))), None)
            if name:
                self.found.append((library, name))

    def text(self, what):
        library, name = self.found[0]
        function = getattr(library, name.format(what))
        function.restype = ctypes.c_char_p
        return function().decode()

    def describe(self):
        return f"{self.text('get_corename')}; {self.text('get_config')}"

    def use_threads(self, count):
        for library, name in self.found:
            getattr(library, name.format("set_num_threads"))(ctypes.c_int(count))


def read(path):
    """Mask (z, y, x), data (images x mask voxels, float32), signs (relabelings x images, float32)."""
    with open(path, "rb") as f:
        nx, ny, nz, n = np.fromfile(f, "<i4", 4)
        mask = np.fromfile(f, np.uint8, nx * ny * nz).reshape(nz, ny, nx) != 0
        voxels = int(mask.sum())
        data = np.fromfile(f, "<f4", n * voxels)
        count = int(np.fromfile(f, "<i4", 1)[0])
        signs = np.fromfile(f, np.int8, count * n)
    if data.size != n * voxels or signs.size != count * n:
        sys.exit(f"{path} is shorter than its header says.")
    return mask, data.reshape(n, voxels), signs.reshape(count, n).astype(np.float32)


def max_rows(S, U, relabelings, voxels, best):
    """A row of the product per relabeling: the maximum runs along contiguous memory."""
    buffer = np.empty(relabelings * voxels, np.float32)
    row_max = np.empty(relabelings, np.float32)
    for v in range(0, U.shape[1], voxels):
        u = np.ascontiguousarray(U[:, v:v + voxels])
        for r in range(0, len(S), relabelings):
            s = S[r:r + relabelings]
            product = buffer[:len(s) * u.shape[1]].reshape(len(s), u.shape[1])
            np.matmul(s, u, out=product)
            np.maximum.reduce(product, axis=1, out=row_max[:len(s)])
            np.maximum(best[r:r + len(s)], row_max[:len(s)], out=best[r:r + len(s)])


def max_columns(S, U, relabelings, voxels, best):
    """A column of the product per relabeling: the maximum is taken row against row."""
    buffer = np.empty(relabelings * voxels, np.float32)
    column_max = np.empty(relabelings, np.float32)
    for r in range(0, len(S), relabelings):
        s = np.ascontiguousarray(S[r:r + relabelings].T)
        count = s.shape[1]
        for v in range(0, U.shape[1], voxels):
            u = U[:, v:v + voxels].T
            product = buffer[:len(u) * count].reshape(len(u), count)
            np.matmul(u, s, out=product)
            np.maximum.reduce(product, axis=0, out=column_max[:count])
            np.maximum(best[r:r + count], column_max[:count], out=best[r:r + count])


def height(S, U, way, threads, blas):
    """The largest r of each relabeling, and the seconds it took."""
    layout, relabelings, voxels, threading = way
    kernel = max_rows if layout == "rows" else max_columns
    workers = threads if threading == "pool" else 1
    blas.use_threads(threads // workers)
    bounds = np.linspace(0, len(S), workers + 1).astype(int)
    best = np.full(len(S), -np.inf, np.float32)
    with ThreadPoolExecutor(workers) as pool:
        start = time.perf_counter()
        list(pool.map(lambda a, b: kernel(S[a:b], U, relabelings, voxels, best[a:b]), bounds[:-1], bounds[1:]))
        return best, time.perf_counter() - start


class Extents:
    """Largest components, on the mask's bounding box: SciPy scans every voxel of the volume it is given."""

    def __init__(self, mask, U, thresholds):
        box = ndimage.find_objects(mask.astype(np.int8))[0]
        self.shape = mask[box].shape
        self.place = np.flatnonzero(mask[box])
        self.U = U
        self.thresholds = np.array(thresholds, np.float32)
        self.structure = ndimage.generate_binary_structure(3, 2)

    def __call__(self, S):
        result = np.zeros((len(S), len(self.thresholds)), np.int64)
        above = np.zeros(self.shape, bool)
        labels = np.zeros(self.shape, np.int32)
        flat, flat_labels = above.ravel(), labels.ravel()
        product = np.empty((len(S), self.U.shape[1]), np.float32)
        np.matmul(S, self.U, out=product)
        for i, r in enumerate(product):
            for j, threshold in enumerate(self.thresholds):
                where = self.place[r > threshold]
                flat[where] = True
                ndimage.label(above, self.structure, output=labels)
                if where.size:
                    result[i, j] = np.bincount(flat_labels[where]).max()
                flat[where] = False
        return result


class Enhanced:
    """Largest sum of size^0.5 h^2 step over heights h, one labelling a height; voxels left behind are not looked at again."""

    def __init__(self, mask, U, step=0.1):
        box = ndimage.find_objects(mask.astype(np.int8))[0]
        self.shape = mask[box].shape
        self.place = np.flatnonzero(mask[box])
        self.U = U
        self.step = step
        self.structure = ndimage.generate_binary_structure(3, 2)

    def __call__(self, S):
        n = len(self.U)
        result = np.zeros(len(S))
        above = np.zeros(self.shape, bool)
        labels = np.zeros(self.shape, np.int32)
        flat, flat_labels = above.ravel(), labels.ravel()
        for i, r in enumerate(S @ self.U):
            t = np.maximum(r, 0)
            t *= np.sqrt((n - 1) / np.maximum(n - t * t, 1e-6))
            left = np.arange(len(t))
            enhanced = np.zeros(len(t))
            for k in range(1, int(t.max() / self.step) + 1):
                h = k * self.step
                left = left[t[left] >= h]
                where = self.place[left]
                flat[:] = False
                flat[where] = True
                ndimage.label(above, self.structure, output=labels)
                component = flat_labels[where]
                enhanced[left] += (np.sqrt(np.bincount(component)) * (h * h * self.step))[component]
            result[i] = enhanced.max()
        return result


def extent(S, job, way, threads, blas):
    """The largest extent of each relabeling at each threshold, and the seconds it took."""
    global forked_job
    blas.use_threads(1)
    size = max(1, min(EXTENT_CHUNK, -(-len(S) // threads)))
    chunks = [S[i:i + size] for i in range(0, len(S), size)]
    if way == "threads":
        with ThreadPoolExecutor(threads) as pool:
            start = time.perf_counter()
            parts = list(pool.map(job, chunks))
            return np.concatenate(parts), time.perf_counter() - start
    forked_job = job
    with multiprocessing.get_context("fork").Pool(threads) as pool:
        pool.map(abs, range(threads))  # the workers are up before the clock starts
        start = time.perf_counter()
        parts = pool.map(run_forked_job, chunks, chunksize=1)
        return np.concatenate(parts), time.perf_counter() - start


def run_forked_job(chunk):
    return forked_job(chunk)


def choose(ways, seconds, rounds=3):
    """The way with the smallest median time; rounds interleave, so that a busy spell hits all ways alike."""
    times = np.array([[seconds(way) for way in ways] for _ in range(rounds)])
    return ways[int(np.argmin(np.median(times, axis=0)))]


def flood_extent(above):
    """Largest component of a small volume by a plain flood fill over face and edge neighbours."""
    steps = [(a, b, c) for a in (-1, 0, 1) for b in (-1, 0, 1) for c in (-1, 0, 1) if 1 <= abs(a) + abs(b) + abs(c) <= 2]
    left, largest = set(zip(*np.nonzero(above))), 0
    while left:
        front, size = [left.pop()], 0
        while front:
            z, y, x = front.pop()
            size += 1
            near = {(z + a, y + b, x + c) for a, b, c in steps} & left
            left -= near
            front.extend(near)
        largest = max(largest, size)
    return largest


def sizes_around(above):
    """Size of each voxel's component by a plain flood fill."""
    steps = [(a, b, c) for a in (-1, 0, 1) for b in (-1, 0, 1) for c in (-1, 0, 1) if 1 <= abs(a) + abs(b) + abs(c) <= 2]
    left, sizes = set(zip(*np.nonzero(above))), np.zeros(above.shape)
    while left:
        component = [left.pop()]
        for z, y, x in component:
            near = {(z + a, y + b, x + c) for a, b, c in steps} & left
            left -= near
            component.extend(near)
        for voxel in component:
            sizes[voxel] = len(component)
    return sizes


def self_check(threads, blas):
    """Every way against float64 sums and a flood fill, on a small irregular mask."""
    rng = np.random.default_rng(1)
    mask = np.zeros((12, 15, 14), bool)
    mask[1:11, 2:14, 1:12] = rng.random((10, 12, 11)) < 0.9
    U = rng.standard_normal((9, int(mask.sum())))
    U = (U / np.sqrt((U * U).sum(axis=0))).astype(np.float32)
    S = rng.choice([-1.0, 1.0], (301, 9)).astype(np.float32)
    exact = np.array([[sum(float(s) * float(u) for s, u in zip(row, column)) for column in U.T] for row in S[:20]])
    # 9 additions of values up to 3 in single precision stay within 1e-5.
    for layout, relabelings, voxels, threading in HEIGHT_WAYS:
        for way in [(layout, relabelings, voxels, threading), (layout, 37, 101, threading)]:
            best, _ = height(S, U, way, threads, blas)
            assert np.abs(best[:20] - exact.max(axis=1)).max() < 1e-5, way
            assert np.abs(best - (S.astype(float) @ U).max(axis=1)).max() < 1e-5, way
    thresholds = [0.6, 1.2, 9.0]
    expected = np.zeros((20, 3), int)
    for i in range(20):
        for j, threshold in enumerate(thresholds):
            assert np.abs(exact[i] - threshold).min() > 1e-6, "a voxel too near the threshold to compare"
            above = np.zeros(mask.shape, bool)
            above[mask] = exact[i] > threshold
            expected[i, j] = flood_extent(above)
    assert (expected[:, 2] == 0).all() and (expected[:, :2] > 1).all()
    for way in EXTENT_WAYS:
        found, _ = extent(S[:20], Extents(mask, U, thresholds), way, threads, blas)
        assert (found == expected).all(), way
    enhanced = np.zeros((3, U.shape[1]))
    for i, r in enumerate(exact[:3]):
        t = np.where(r > 0, r * np.sqrt(8 / (9 - r * r)), 0)
        for k in range(1, int(t.max() / 0.1) + 1):
            above = np.zeros(mask.shape, bool)
            above[mask] = t >= k * 0.1
            enhanced[i] += np.where(above[mask], sizes_around(above)[mask] ** 0.5, 0) * (k * 0.1) ** 2 * 0.1
    for way in EXTENT_WAYS:
        found, _ = extent(S[:3], Enhanced(mask, U), way, threads, blas)
        # A voxel within rounding of a height may fall on either side of it.
        assert np.abs(found - enhanced.max(axis=1)).max() < 1e-3 * enhanced.max(), way
    print("self-check passed")


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--data", help="input file, laid out as README.md says")
    parser.add_argument("--what", choices=["height", "extent", "tfce"], default="height")
    parser.add_argument("--forming-r", default="", help="thresholds on r, separated by commas (extent)")
    parser.add_argument("--relabelings", type=int, default=10000, help="the first so many of the file's")
    parser.add_argument("--threads", type=int, default=2)
    parser.add_argument("--repeat", type=int, default=5)
    parser.add_argument("--neighbours", type=int, choices=[18], default=18)
    parser.add_argument("--coretype", help="OpenBLAS kernels, in place of the best the processor can run")
    parser.add_argument("--self-check", action="store_true", help="check the results on small data and stop")
    args = parser.parse_args()

    # OpenBLAS reads these when it is loaded, so NumPy is imported only now.
    for name in ("OPENBLAS_L2_SIZE", "OPENBLAS_CORETYPE"):
        os.environ.pop(name, None)
    core = args.coretype or best_kernel()
    if core:
        os.environ["OPENBLAS_CORETYPE"] = core
    for name in ("OPENBLAS_NUM_THREADS", "OMP_NUM_THREADS"):
        os.environ[name] = str(args.threads)
    global np, ndimage
    import numpy as np
    import scipy
    from scipy import ndimage

    blas = Blas()
    if not blas.found:
        sys.exit("NumPy found no OpenBLAS, so its times would be unfairly slow: install libopenblas0-pthread.")
    if args.self_check:
        return self_check(args.threads, blas)
    if not args.data:
        parser.error("--data is needed.")
    mask, U, signs = read(args.data)
    if not 1 <= args.relabelings <= len(signs):
        parser.error(f"--relabelings must be 1 to {len(signs)}, the number in the file, but was {args.relabelings}.")
    S = signs[:args.relabelings]
    result = {"what": args.what, "relabelings": len(S), "voxels": U.shape[1], "images": U.shape[0],
              "threads": args.threads, "numpy": np.__version__, "scipy": scipy.__version__, "blas": blas.describe()}
    if args.what == "height":
        way = choose(HEIGHT_WAYS, lambda w: height(S[:2000], U, w, args.threads, blas)[1])
        runs = [height(S, U, way, args.threads, blas) for _ in range(args.repeat)]
        result.update(way=way, max=runs[0][0][:5].tolist(), extent=[])
    elif args.what == "tfce":
        job = Enhanced(mask, U)
        way = choose(EXTENT_WAYS, lambda w: extent(S[:2], job, w, args.threads, blas)[1], rounds=1)
        runs = [extent(S, job, way, args.threads, blas) for _ in range(args.repeat)]
        result.update(way=way, max=runs[0][0][:5].tolist(), extent=[])
    else:
        try:
            thresholds = [float(text) for text in args.forming_r.split(",")]
        except ValueError:
            parser.error(f"--forming-r needs numbers separated by commas, but was '{args.forming_r}'.")
        job = Extents(mask, U, thresholds)
        way = choose(EXTENT_WAYS, lambda w: extent(S[:32], job, w, args.threads, blas)[1])
        runs = [extent(S, job, way, args.threads, blas) for _ in range(args.repeat)]
        found = runs[0][0][:5]
        result.update(way=way, max=(S[:5] @ U).max(axis=1).tolist(), extent=found[:, 0].tolist(),
                      forming_r=thresholds, extents_by_r=found.T.tolist())
    result["seconds"] = [seconds for _, seconds in runs]
    print(json.dumps(result))


if __name__ == "__main__":
    main()
