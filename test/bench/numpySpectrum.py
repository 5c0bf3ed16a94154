"""The script an engineer writes: the characteristic matrix of every layer, complex, vectorised over the energies, and
their product. Prints ns per layer and energy for the work of spectrum.bench.js: 21 layers, 2048 energies, T and R."""
import time

import numpy as np

C = 0.0380998211096858


def spectrum(E, V, m, d):
    """Leads first and last in V and m; d of the layers between."""
    k = [np.sqrt(m[i] * (E - V[i]) / C + 0j) for i in range(len(V))]
    m11 = np.ones_like(k[0])
    m12 = np.zeros_like(k[0])
    m21 = np.zeros_like(k[0])
    m22 = np.ones_like(k[0])
    for j in range(1, len(V) - 1):
        y = k[j] / m[j]
        c = np.cos(k[j] * d[j - 1])
        s = np.sin(k[j] * d[j - 1])
        m11, m12, m21, m22 = (
            m11 * c + m12 * y * s,
            m12 * c - m11 * s / y,
            m21 * c + m22 * y * s,
            m22 * c - m21 * s / y,
        )
    y0 = k[0] / m[0]
    y1 = k[-1] / m[-1]
    u = m11 + 1j * y1 * m12
    v = m21 + 1j * y1 * m22
    a = 0.5 * (u + v / (1j * y0))
    b = 0.5 * (u - v / (1j * y0))
    return (y1 / y0).real / np.abs(a) ** 2, np.abs(b / a) ** 2


layers, points = 21, 2048
E = 0.005 + 0.395 * np.arange(points) / points
V = [0.0] + [0.3 if j % 2 == 0 else 0.01 for j in range(layers)] + [0.0]
m = [0.067] + [0.092 if j % 2 == 0 else 0.067 for j in range(layers)] + [0.067]
d = [2.5 if j % 2 == 0 else 5.0 for j in range(layers)]
best = 1e9
for _ in range(30):
    start = time.perf_counter()
    T, R = spectrum(E, V, m, d)
    best = min(best, time.perf_counter() - start)
assert np.max(np.abs(T + R - 1)) < 1e-9
print(best / (layers * points) * 1e9)
