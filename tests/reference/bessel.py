"""Makes bessel.csv: J_n(z) and H_n^(2)(z) by scipy.special (Debian python3-scipy), Amos's algorithms.

Run:  /usr/bin/python3 tests/reference/bessel.py > tests/reference/bessel.csv
Columns: n, Re z, Im z, Re J, Im J, Re H, Im H.  Seeded, so that the table is the same every time.
"""
import numpy as np
from scipy.special import hankel2, jv

random = np.random.default_rng(20)
rows = []
for size in (1e-3, 0.03, 0.4, 1.0, 1.99, 2.01, 3.7, 8.0, 15.0, 25.0, 40.0, 60.0):
    for angle in (0.0, 0.01, 0.1, 0.4, 1.0, 1.5):
        z = size * np.exp(-1j * angle)
        for n in sorted(set([0, 1, 2, 40] + list(random.integers(3, 40, 2)))):
            rows.append((int(n), z, jv(n, z), hankel2(n, z)))
print("n,z_re,z_im,j_re,j_im,h_re,h_im")
for n, z, j, h in rows:
    print(f"{n},{z.real:.17g},{z.imag:.17g},{j.real:.17g},{j.imag:.17g},{h.real:.17g},{h.imag:.17g}")
