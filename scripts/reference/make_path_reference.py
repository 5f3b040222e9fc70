#!/usr/bin/python3
"""Reference values for the whole path from a file to a result, by scikit-learn.

Reads tests/fixtures/sessions/small.npz, forms rates between 100 and 300 ms, and runs the scaler and a ridge regression whose
penalty is chosen among 25 values by exact leave-one-out on the scaled training trials, on given folds and given permutations.
Writes tests/fixtures/path-reference.json. Needs Debian's python3-sklearn; run from the top of the checkout.
"""
import json
import sys

import numpy as np
import sklearn
from sklearn.linear_model import RidgeCV
from sklearn.preprocessing import StandardScaler

SEED, N_FOLDS, N_DRAWS = 20261201, 5, 150
data = np.load("tests/fixtures/sessions/small.npz")
counts, label = data["counts"].astype(float), data["shared_fraction"]
rates = counts[:, :, 4:12].sum(2) / 0.2
n = len(label)
random = np.random.default_rng(SEED)
assignment = random.permutation(np.arange(n) % N_FOLDS)
permutations = [random.permutation(n) for _ in range(N_DRAWS)]


def held_out(y):
    predicted, baseline, chosen = np.empty(n), np.empty(n), []
    for fold in range(N_FOLDS):
        train, test = assignment != fold, assignment == fold
        scaler = StandardScaler().fit(rates[train])
        grid = max(train.sum(), rates.shape[1]) * 10 ** np.linspace(-4, 4, 25)
        # cv=None with alpha_per_target False is the closed-form leave-one-out, intercept included, on the features as scaled.
        model = RidgeCV(alphas=grid[::-1], cv=None).fit(scaler.transform(rates[train]), y[train])
        predicted[test] = model.predict(scaler.transform(rates[test]))
        baseline[test] = y[train].mean()
        chosen.append(float(model.alpha_))
    return 1 - ((y - predicted) ** 2).sum() / ((y - baseline) ** 2).sum(), predicted, chosen


r2, predicted, chosen = held_out(label)
drawn = [held_out(label[order])[0] for order in permutations]
out = {
    "made with": {"scikit-learn": sklearn.__version__, "numpy": np.__version__, "python": sys.version.split()[0], "seed": SEED},
    "window": {"startMs": 100, "endMs": 300},
    "assignment": assignment.tolist(),
    "permutations": [order.tolist() for order in permutations],
    "r2": r2,
    "penalty": chosen,
    "predicted": predicted.tolist(),
    "drawn": drawn,
    "exceedances": int(sum(value >= r2 - 1e-12 * max(1, abs(r2)) for value in drawn)),
}
json.dump(out, open(sys.argv[1] if len(sys.argv) > 1 else "tests/fixtures/path-reference.json", "w"))
print(r2, chosen, out["exceedances"])
