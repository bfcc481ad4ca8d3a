"""Recomputes expected values of the fabric tests with numpy and scipy alone; prints them and stops at a difference.

Run: python3 tests/reference/expected.py   (numpy 2.4, scipy 1.17)
Nothing here shares code with the crate: integrals by scipy.integrate.quad, fits by scipy.optimize.
Frame: x north, y east, z down.
"""

from pathlib import Path

import numpy as np
from scipy import integrate, optimize, special, stats

HERE = Path(__file__).parent


def rows(name):
    return np.genfromtxt(HERE / name, delimiter=",", skip_header=1)[:, -2:]


def lines(trend, plunge):
    t, p = np.radians(trend), np.radians(plunge)
    return np.stack([np.cos(p) * np.cos(t), np.cos(p) * np.sin(t), np.sin(p)], -1)


def poles(name):
    r = rows(name)
    return lines(r[:, 0] + 180, 90 - r[:, 1])


def eigen(x, w=None):
    w = np.ones(len(x)) if w is None else w
    values, vectors = np.linalg.eigh((x * w[:, None]).T @ x / w.sum())
    return values[::-1], vectors[:, ::-1]


def trend_plunge(v):
    v = v if v[2] >= 0 else -v
    return np.degrees(np.arctan2(v[1], v[0])) % 360, np.degrees(np.arcsin(v[2]))


def check(what, got, want, tolerance=1e-6):
    got, want = np.atleast_1d(got), np.atleast_1d(want)
    print(f"{what}: {np.array2string(got, precision=10)}")
    assert np.all(np.abs(got - want) <= tolerance * np.maximum(1, np.abs(want))), (what, got, want)


def cone(x, which):
    """Semi-axes of the confidence cone with Hotelling's factor."""
    n = len(x)
    s, v = eigen(x)
    j, l = [k for k in range(3) if k != which]
    y = x @ v
    e = np.array(
        [[np.mean(y[:, a] * y[:, b] * y[:, which] ** 2) / ((s[which] - s[a]) * (s[which] - s[b])) for b in (j, l)] for a in (j, l)]
    )
    factor = 2 * (n - 1) / (n - 2) * stats.f.ppf(0.95, 2, n - 2)
    return np.degrees(np.arcsin(np.sqrt(np.linalg.eigvalsh(e / n)[::-1] * factor)))


def bingham_log_c(k2, k3):
    f = lambda z: np.exp(k3 * z * z) * special.ive(0, (1 - z * z) * k2 / 2)
    return np.log(integrate.quad(f, 0, 1, epsabs=0, epsrel=1e-13, limit=500, points=[min(1, 3 / np.sqrt(-k3 + 1))])[0])


def bingham_fit(s):
    f = lambda p: bingham_log_c(-np.exp(p[0]), -np.exp(p[1])) + np.exp(p[0]) * s[1] + np.exp(p[1]) * s[2]
    p = optimize.minimize(f, [0.0, np.log(0.5 / s[2])], method="Nelder-Mead", options=dict(xatol=1e-10, fatol=1e-14, maxiter=4000)).x
    return -np.exp(p)


def watson_mean_square(k):
    return special.hyp1f1(1.5, 2.5, k) / (3 * special.hyp1f1(0.5, 1.5, k))


# Tensors, cones
for name, s in [
    ("syn_steep8.csv", [0.9652200848, 0.0267549868, 0.0080249284]),
    ("syn_fold24.csv", [0.5636639423, 0.4335101202, 0.0028259375]),
    ("syn_cone20.csv", [0.6351259144, 0.3527049406, 0.0121691451]),
    ("syn_bingham60.csv", [0.8858765041, 0.0849175118, 0.0292059842]),
    ("syn_joints90.csv", [0.4070634784, 0.3217873633, 0.2711491583]),
]:
    check(f"S of {name}", eigen(poles(name))[0], s, 1e-9)
check("e1 of syn_steep8", trend_plunge(eigen(poles("syn_steep8.csv"))[1][:, 0]), [273.892429, 2.181140])
check("e3 of syn_fold24", trend_plunge(eigen(poles("syn_fold24.csv"))[1][:, 2]), [40.552442, 20.586815])
check("cone of e1, syn_steep8", cone(poles("syn_steep8.csv"), 0), [11.86635856, 6.40777860])
check("cone of e3, syn_fold24", cone(poles("syn_fold24.csv"), 2), [2.69003602, 2.11249477])
check("cone of e1, syn_bingham60", cone(poles("syn_bingham60.csv"), 0), [5.51396339, 3.41423682])

# Concentrations
s = eigen(poles("syn_bingham60.csv"))[0]
k = bingham_fit(s)
check("Bingham fit, syn_bingham60", k, [-6.636332563, -17.749708484], 1e-5)
check("ln c there", bingham_log_c(*k), -3.013656146, 1e-6)
check("Bingham fit, syn_steep8", bingham_fit(eigen(poles("syn_steep8.csv"))[0]), [-19.24009212, -62.83384108], 1e-5)
check("ln 4 pi c at (-4,-15)", bingham_log_c(-4, -15) + np.log(4 * np.pi), -0.0978976688, 1e-9)
for name, which, want in [("syn_steep8.csv", 0, 29.291291689154), ("syn_bingham60.csv", 0, 9.4577795418), ("syn_fold24.csv", 2, -176.93243478)]:
    target = eigen(poles(name))[0][which]
    low, high = (1e-3, 500) if want > 0 else (-600, -1e-3)
    check(f"Watson kappa, {name}", optimize.brentq(lambda k: watson_mean_square(k) - target, low, high, xtol=1e-12), want, 1e-8)

# Fisher, on the packaged pole positions
lat, long = np.radians(rows("boot_polar.csv")).T
x = np.stack([np.cos(lat) * np.cos(long), np.cos(lat) * np.sin(long), np.sin(lat)], -1)
n, r = len(x), np.linalg.norm(x.sum(0))
check("R", r, 38.4391702874, 1e-9)
check("kappa", (n - 1) / (n - r), 4.2384501129, 1e-9)
check("alpha95", np.degrees(np.arccos(1 - (n - r) / r * (20 ** (1 / (n - 1)) - 1))), 11.1752935737, 1e-9)
check("kappa by likelihood", optimize.brentq(lambda k: 1 / np.tanh(k) - 1 / k - r / n, 0.1, 100, xtol=1e-13), 4.3183183999, 1e-9)
check("interval of kappa", stats.chi2.ppf([0.025, 0.975], 2 * n - 2) / (2 * (n - r)), [3.1356287265, 5.5048848365], 1e-9)
s = eigen(x)[0]
check("Bingham's statistic", 7.5 * n * np.sum((s - 1 / 3) ** 2), 67.3558113019, 1e-9)

# Kent, directed lines
x = lines(*rows("syn_kent30.csv").T)
n, mean = len(x), x.mean(0)
r1 = np.linalg.norm(mean)
g1 = mean / r1
basis = np.linalg.svd(np.eye(3) - np.outer(g1, g1))[0][:, :2]
small, big = np.linalg.eigvalsh(basis.T @ (x.T @ x / n) @ basis)
a, b = 1 / (2 - 2 * r1 - (big - small)), 1 / (2 - 2 * r1 + (big - small))
check("Kent moments", [a + b, (a - b) / 2], [31.3211606016, 10.7361738555], 1e-9)
g = -2 * np.log(0.05) / (n * r1 * r1)
check("Kent ellipse", np.degrees(np.arcsin(np.sqrt(np.array([big, small]) * g))), [8.5527361015, 3.3623743619], 1e-9)

# Cone against cylinder: ends as the poles are plotted (lower hemisphere)
x = poles("syn_fold24.csv")
centred = x - x.mean(0)
values, vectors = np.linalg.eigh(centred.T @ centred)
great = len(x) * eigen(x)[0][2]
f = (len(x) - 3) * (great - values[0]) / values[0]
check("half-angle", np.degrees(np.arccos(abs(vectors[:, 0] @ x.mean(0)))), 87.7238466939, 1e-9)
check("F and p", [f, stats.f.sf(f, 1, len(x) - 3)], [1.1243322665, 0.3010312848], 1e-8)

# Survey weights
x = poles("syn_scanline30.csv")
for what, sine, cap, total in [
    ("line, no cap", np.abs(x @ lines(75, 10)), np.inf, 90.4123364364),
    ("line, cap 10", np.abs(x @ lines(75, 10)), 10, 84.9294546),
    ("map", np.hypot(x[:, 0], x[:, 1]), 10, 39.1758683376),
    ("face", np.sqrt(1 - (x @ lines(200, 60)) ** 2), 10, 35.5256296903),
]:
    w = np.minimum(1 / sine, cap)
    check(f"sum of weights, {what}", w.sum(), total, 1e-8)

# Density: exponential weights, 3 standard deviations
x = poles("syn_fold24.csv")
nodes = np.array([lines(0, 90), lines(270, 0), lines(143, 31), lines(40, 20)])
f = 2 * (1 + len(x) / 9)
sums = np.exp(f * (np.abs(nodes @ x.T) - 1)).sum(1)
sd = np.sqrt(len(x) * (f / 2 - 1)) / f
check("densities", (sums - len(x) / f) / sd, [0.77054344, -0.94188301, 2.82256581, -2.97932974], 1e-7)

print("all as stated")
