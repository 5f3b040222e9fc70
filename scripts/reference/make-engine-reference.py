#!/usr/bin/python3
"""Reference values for the readout engine, worked out with scikit-learn and numpy (Debian: python3-sklearn).

usage: make-engine-reference.py [OUT]     default OUT: tests/fixtures/engine-reference.json beside this repository

Data, folds and permutations come from one linear congruential generator in whole numbers, so that the test can make
them again without files: x <- (1664525 x + 1013904223) mod 2^32, whole(m) = (x >> 8) mod m (Numerical Recipes' constants).
Each setting is one data set, one estimator, given folds and given permutations. Every fitted step (scaling, penalty) is
refitted on the training trials of each fold, for the observed labels and for every permutation. Leave-one-out works on
features that were scaled once with the training trials' mean and 1/n standard deviation, and refits intercept and
coefficients without each trial in turn; RidgeCV's efficient form is checked here against explicit refits.
"""
import json
import os
import sys

import numpy as np
import scipy
import sklearn
from sklearn.cross_decomposition import PLSRegression
from sklearn.decomposition import PCA
from sklearn.linear_model import LinearRegression, Ridge, RidgeCV
from sklearn.preprocessing import StandardScaler

SEED = 20261201
DRAWS = 1000
FOLDS = 5
LEVELS = 6
CHANCES = 24  # a count is the number of successes among this many chances in each of 3 bins


class Lcg:
    def __init__(self, seed):
        self.x = seed & 0xFFFFFFFF

    def whole(self, m):
        self.x = (1664525 * self.x + 1013904223) & 0xFFFFFFFF
        return (self.x >> 8) % m

    def shuffled(self, n):
        order = list(range(n))
        for i in range(n - 1, 0, -1):
            j = self.whole(i + 1)
            order[i], order[j] = order[j], order[i]
        return order


def make_data(seed, n, units, step, tuned):
    """Counts n x units x 3 and labels level/5. A count has threshold base + gain[trial] + sign * step * level (tuned units)."""
    g = Lcg(seed)
    level = [g.whole(LEVELS) for _ in range(n)]
    gain = [g.whole(61) - 30 for _ in range(n)]
    base = [80 + g.whole(300) for _ in range(units)]
    sign = [(1 if g.whole(2) else -1) if u < tuned else 0 for u in range(units)]
    base[units - 1] = -10**6  # one silent unit: no variance anywhere
    counts = np.zeros((n, units, 3), dtype=np.int64)
    for t in range(n):
        for u in range(units):
            bar = base[u] + gain[t] + sign[u] * step * level[t]
            for b in range(3):
                counts[t, u, b] = sum(g.whole(1000) < bar for _ in range(CHANCES))
    fold = [0] * n
    for at, i in enumerate(g.shuffled(n)):
        fold[i] = at % FOLDS
    perms = [g.shuffled(n) for _ in range(DRAWS)]
    inner = []
    for f in range(FOLDS):
        train = [i for i in range(n) if fold[i] != f]
        row = [-1] * n
        for at, j in enumerate(g.shuffled(len(train))):
            row[train[j]] = at % 4
        inner.append(row)
    return counts, np.array(level) / 5.0, np.array(fold), np.array(perms), np.array(inner)


def grid(n_train, p):
    return max(n_train, p) * 10.0 ** (4 - np.arange(25) / 3)


def explicit_loo(Z, y, alphas):
    best = []
    for a in alphas:
        sse = 0.0
        for i in range(len(y)):
            keep = np.arange(len(y)) != i
            m = Ridge(alpha=a).fit(Z[keep], y[keep])
            sse += (y[i] - m.predict(Z[i : i + 1])[0]) ** 2
        best.append(sse)
    return alphas[int(np.argmin(best))]


def fit_predict(kind, X, Y, train, test, inner_row, check):
    """Predictions (test x targets) and the chosen penalty of the first target."""
    s = StandardScaler().fit(X[train])
    Z, T = s.transform(X[train]), s.transform(X[test])
    if kind == 'leastSquares' and len(train) <= X.shape[1]:
        # LinearRegression's cutoff (one rounding unit) keeps the direction of constant vectors, whose singular value is
        # rounding noise once features are centred, and so adds noise to the fit; numpy's lstsq drops it (rank n - 1).
        mean = Y[train].mean(0)
        coef, _, rank, _ = np.linalg.lstsq(Z, Y[train] - mean, rcond=None)
        assert rank == len(train) - 1
        return T @ coef + mean, None
    if kind == 'leastSquares':
        return LinearRegression().fit(Z, Y[train]).predict(T), None
    if kind == 'ridgeFixed':
        return Ridge(alpha=50.0).fit(Z, Y[train]).predict(T), 50.0
    if kind == 'ridgeLeaveOneOut':
        alphas = grid(len(train), X.shape[1])
        m = RidgeCV(alphas=alphas, alpha_per_target=True).fit(Z, Y[train])
        if check:
            assert explicit_loo(Z, Y[train][:, 0], alphas) == m.alpha_[0]
        return m.predict(T), float(m.alpha_[0])
    if kind == 'ridgeInnerFolds':
        alphas = grid(len(train), X.shape[1])
        sse = np.zeros((len(alphas), Y.shape[1]))
        for k in range(4):
            a = np.array([i for i in train if inner_row[i] != k])
            b = np.array([i for i in train if inner_row[i] == k])
            si = StandardScaler().fit(X[a])
            for l, alpha in enumerate(alphas):
                m = Ridge(alpha=alpha).fit(si.transform(X[a]), Y[a])
                sse[l] += ((Y[b] - m.predict(si.transform(X[b]))) ** 2).sum(0)
        pick = sse.argmin(0)
        out = np.empty((len(test), Y.shape[1]))
        for l in np.unique(pick):
            cols = pick == l
            out[:, cols] = Ridge(alpha=alphas[l]).fit(Z, Y[train][:, cols]).predict(T)
        return out, float(alphas[pick[0]])
    if kind == 'pcr':
        pca = PCA(n_components=5, svd_solver='full').fit(Z)
        return LinearRegression().fit(pca.transform(Z), Y[train]).predict(pca.transform(T)), None
    if kind == 'pls':
        cols = [PLSRegression(n_components=3, scale=False).fit(Z, Y[train][:, c]).predict(T).ravel() for c in range(Y.shape[1])]
        return np.stack(cols, 1), None
    raise ValueError(kind)


def run(data, kind, draws):
    counts, y, fold, perms, inner = data
    n = len(y)
    X = counts.sum(2) / (3 * 0.025)  # spikes/s, bins of 25 ms
    Y = np.column_stack([y] + [y[p] for p in perms[:draws]])
    error = np.zeros(Y.shape[1])
    base = np.zeros(Y.shape[1])
    predicted = np.zeros(n)
    penalties = []
    for f in range(FOLDS):
        train, test = np.where(fold != f)[0], np.where(fold == f)[0]
        P, penalty = fit_predict(kind, X, Y, train, test, inner[f], check=f == 0)
        predicted[test] = P[:, 0]
        penalties.append(penalty)
        error += ((Y[test] - P) ** 2).sum(0)
        base += ((Y[test] - Y[train].mean(0)) ** 2).sum(0)
    r2 = 1 - error / base
    bar = r2[0] - 1e-12 * max(1, abs(r2[0]))
    return dict(
        r2=float(r2[0]),
        exceedances=int((r2[1:] >= bar).sum()),
        penalties=penalties,
        predicted=[float('%.14g' % v) for v in predicted],
        draws=draws,
        nullR2=[round(float(v), 13) for v in r2[1:]],
    )


DATA = [
    dict(name='noise, p < n', seed=SEED, n=120, units=30, step=0, tuned=0),
    dict(name='noise, p > n', seed=SEED + 1, n=60, units=90, step=0, tuned=0),
    dict(name='weak signal, p < n', seed=SEED + 2, n=120, units=30, step=3, tuned=6),
    dict(name='weak signal, p > n', seed=SEED + 3, n=60, units=90, step=4, tuned=18),
]
KINDS = [('leastSquares', DRAWS), ('ridgeFixed', DRAWS), ('ridgeLeaveOneOut', DRAWS), ('ridgeInnerFolds', 200), ('pcr', 200), ('pls', 40)]


def main():
    here = os.path.dirname(os.path.abspath(__file__))
    out = sys.argv[1] if len(sys.argv) > 1 else os.path.join(here, '../../tests/fixtures/engine-reference.json')
    settings = []
    for d in DATA:
        data = make_data(d['seed'], d['n'], d['units'], d['step'], d['tuned'])
        for kind, draws in KINDS:
            result = run(data, kind, draws)
            settings.append(dict(data=d, countsSum=int(data[0].sum()), kind=kind, **result))
            print(d['name'], kind, 'R2 %.4f' % result['r2'], result['exceedances'], 'of', draws, file=sys.stderr)
            if d['tuned'] and draws == DRAWS:
                assert 20 <= result['exceedances'] <= 800, 'not a weak signal: change its step'
    doc = dict(
        madeBy='scripts/reference/make-engine-reference.py',
        seed=SEED,
        versions=dict(python=sys.version.split()[0], numpy=np.__version__, scipy=scipy.__version__, sklearn=sklearn.__version__),
        settings=settings,
    )
    with open(out, 'w') as f:
        json.dump(doc, f, separators=(',', ':'))
        f.write('\n')


main()
