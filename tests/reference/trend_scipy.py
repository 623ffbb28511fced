"""Reads series as JSON from standard input; writes what SciPy says of each.

Mann-Kendall: S from kendalltau is not given, so its tau-b and exact or asymptotic probability are.
"""
import json
import sys

from scipy import stats

answers = []
for series in json.load(sys.stdin):
    x, y = series["x"], series["y"]
    slope, intercept, low, high = stats.theilslopes(y, x, 0.95)
    tau = stats.kendalltau(x, y)
    exact = len(y) <= 10 and len(set(y)) == len(y)
    method = "exact" if exact else "asymptotic"
    p = stats.kendalltau(x, y, method=method).pvalue
    answers.append(
        {"slope": slope, "low": low, "high": high, "tau": tau.statistic, "p": p, "exact": exact}
    )
json.dump(answers, sys.stdout)
