#!/usr/bin/python3
"""Reference values for the benchmark's statistics and filters, from SciPy. Output beside this file, with version and date."""
import datetime
import json
import os

import numpy as np
import scipy
from scipy import signal, special, stats

HERE = os.path.dirname(os.path.abspath(__file__))


def write(name, **content):
    made = f"scipy {scipy.__version__}, numpy {np.__version__}, {datetime.date.today().isoformat()}"
    with open(os.path.join(HERE, name), "w") as file:
        json.dump(dict(made=made, **content), file, indent=1)
        file.write("\n")


# Exact limits of a share: quantiles of beta distributions.
limits = []
for count, total, tail in ((0, 10, 0.025), (1, 10, 0.025), (4, 20, 0.05), (3, 1000, 0.05), (500, 1000, 0.025), (999, 1000, 0.025), (10, 10, 0.05)):
    low = 0.0 if count == 0 else stats.beta.ppf(tail, count, total - count + 1)
    high = 1.0 if count == total else stats.beta.ppf(1 - tail, count + 1, total - count)
    limits.append(dict(count=count, total=total, tail=tail, low=float(low), high=float(high)))
beta = [dict(x=x, a=a, b=b, value=float(special.betainc(a, b, x))) for x, a, b in ((0.1, 0.5, 0.5), (0.3, 2, 5), (0.9, 40, 6), (0.02, 3, 300), (0.999, 1000, 2))]
gamma = [dict(x=x, value=float(special.gammaln(x))) for x in (0.5, 1.0, 3.5, 10.0, 250.25)]
write("shares.json", limits=limits, incompleteBeta=beta, logGamma=gamma)

# Bessel low-passes, −3 dB at 100 Hz.
cases = []
freqs = [10.0, 50.0, 100.0, 150.0, 300.0, 1000.0]
for order in (2, 4, 8):
    b, a = signal.bessel(order, 2 * np.pi * 100, analog=True, norm="mag")
    _, h = signal.freqs(b, a, 2 * np.pi * np.array(freqs))
    cases.append(dict(order=order, magnitude=[float(v) for v in np.abs(h)]))
write("bessel.json", cornerHz=100.0, frequencyHz=freqs, cases=cases)
