#!/usr/bin/python3
"""The Python halves of the speed table, on Debian's scikit-learn and numpy.

usage: bench.py MODE FOLDER   MODE: plain | batched | numpy | gemm
FOLDER holds x.f64 (n*p), y.f64 (n), fold.i32 (n), perms.i32 (B*n), shape.json {n, p, B, windows, sample}.
Prints one JSON line: {seconds, r2, exceedances} (and what was extrapolated). BLAS runs at one thread a process.
"""
import json
import multiprocessing
import os
import resource
import sys
import time

for name in ('OPENBLAS_NUM_THREADS', 'OMP_NUM_THREADS'):
    os.environ[name] = '1'
import numpy as np  # noqa: E402

mode, folder = sys.argv[1], sys.argv[2]
shape = json.load(open(os.path.join(folder, 'shape.json')))
K = 5


def load():
    n, p, B = shape['n'], shape['p'], shape['B']
    x = np.fromfile(os.path.join(folder, 'x.f64')).reshape(n, p)
    y = np.fromfile(os.path.join(folder, 'y.f64'))
    fold = np.fromfile(os.path.join(folder, 'fold.i32'), dtype=np.int32)
    perms = np.fromfile(os.path.join(folder, 'perms.i32'), dtype=np.int32).reshape(B, n)
    return x, y, fold, perms


def grid(n_train, p):
    return max(n_train, p) * 10.0 ** (4 - np.arange(25) / 3)


def fold_numpy(f):
    """One fold by hand: one factorisation, all labels as rows, exact leave-one-out for every penalty."""
    tr, te = DATA['fold'] != f, DATA['fold'] == f
    x, Y = DATA['x'], DATA['Y']
    m, s = x[tr].mean(0), x[tr].std(0)
    s[s == 0] = 1
    z, t = (x[tr] - m) / s, (x[te] - m) / s
    n, p = z.shape
    if p < n:
        w, v = np.linalg.eigh(z.T @ z)
        left, test = z @ v, t @ v
        num = np.ones_like(w)
    else:
        w, u = np.linalg.eigh(z @ z.T)
        left, test = u, t @ (z.T @ u)
        num = np.maximum(w, 0)
    w = np.maximum(w, 0)
    ybar = Y[:, tr].mean(1, keepdims=True)
    yc = Y[:, tr] - ybar
    c = yc @ left
    lam = grid(n, p)
    best = np.full(len(Y), np.inf)
    pick = np.zeros(len(Y), dtype=int)
    sq = left * left
    for l in range(len(lam)):
        g = num / (w + lam[l])
        h = 1.0 / n + sq @ g
        e = yc - (c * g) @ left.T
        e /= 1 - h
        score = np.einsum('ij,ij->i', e, e)
        better = score < best * (1 - 1e-12)
        best[better], pick[better] = score[better], l
    pred = ybar + (c / (w + lam[pick][:, None])) @ test.T
    return ((Y[:, te] - pred) ** 2).sum(1), ((Y[:, te] - ybar) ** 2).sum(1)


def fold_sklearn(f):
    """One fold by scikit-learn with all labels as targets of one RidgeCV."""
    from sklearn.linear_model import RidgeCV
    from sklearn.preprocessing import StandardScaler

    tr, te = DATA['fold'] != f, DATA['fold'] == f
    x, Y = DATA['x'], DATA['Y']
    scaler = StandardScaler().fit(x[tr])
    ytr = Y[:, tr].T
    model = RidgeCV(alphas=grid(tr.sum(), x.shape[1]), alpha_per_target=True).fit(scaler.transform(x[tr]), ytr)
    pred = model.predict(scaler.transform(x[te])).T
    ybar = ytr.mean(0)[:, None]
    return ((Y[:, te] - pred) ** 2).sum(1), ((Y[:, te] - ybar) ** 2).sum(1)


def by_folds(work, draws):
    global DATA
    x, y, fold, perms = load()
    DATA = dict(x=x, fold=fold, Y=np.vstack([y[None], y[perms[:draws]]]))
    start = time.perf_counter()
    with multiprocessing.get_context('fork').Pool(2) as pool:
        parts = pool.map(work, range(K), chunksize=1)
    seconds = time.perf_counter() - start
    usage = resource.getrusage(resource.RUSAGE_CHILDREN)
    r2 = 1 - sum(a for a, _ in parts) / sum(b for _, b in parts)
    bar = r2[0] - 1e-12 * max(1, abs(r2[0]))
    return dict(seconds=seconds, cpuSeconds=usage.ru_utime + usage.ru_stime, r2=float(r2[0]), exceedances=int((r2[1:] >= bar).sum()), draws=draws)


def plain(draws):
    """What a scientist would script: a pipeline and permutation_test_score, two jobs; fewer permutations, extrapolated."""
    from sklearn.linear_model import RidgeCV
    from sklearn.model_selection import PredefinedSplit, cross_val_score, permutation_test_score
    from sklearn.pipeline import make_pipeline
    from sklearn.preprocessing import StandardScaler

    x, y, fold, _ = load()
    model = make_pipeline(StandardScaler(), RidgeCV(alphas=grid((fold != 0).sum(), x.shape[1])))
    cv = PredefinedSplit(fold)
    cross_val_score(model, x, y, cv=cv)  # imports and first touches are not counted
    start = time.perf_counter()
    permutation_test_score(model, x, y, cv=cv, n_permutations=draws, n_jobs=2, scoring='r2', random_state=1)
    seconds = time.perf_counter() - start
    return dict(seconds=seconds * (shape['B'] + 1) / (draws + 1), draws=draws, extrapolated=True)


def gemm():
    """GEMM rates of one core, double and single precision, best of five at 1,000 x 1,000 x 1,000."""
    out = {}
    for name, kind in (('double', np.float64), ('single', np.float32)):
        a, b = (np.random.default_rng(1).standard_normal((1000, 1000)).astype(kind) for _ in range(2))
        best = np.inf
        for _ in range(5):
            start = time.perf_counter()
            a @ b
            best = min(best, time.perf_counter() - start)
        out[name] = 2e9 / best
    return out


if mode == 'plain':
    result = plain(shape['sample'])
elif mode == 'batched':
    result = by_folds(fold_sklearn, shape['batchedDraws'])
    if shape['batchedDraws'] < shape['B']:
        result['extrapolated'] = True
elif mode == 'numpy':
    result = by_folds(fold_numpy, shape['B'])
else:
    result = gemm()
print(json.dumps(result))
