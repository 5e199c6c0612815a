"""Milliseconds of torch for what networks.ts times, one thread: python3 networks_torch.py INPUTS BATCH WIDTH...

Prints one JSON list of [training step, input gradients] for each width; medians of 9 runs of 50.
"""

import json
import os
import sys
import time

os.environ["OPENBLAS_NUM_THREADS"] = "1"
import torch  # noqa: E402

inputs, batch, *widths = map(int, sys.argv[1:])
torch.set_num_threads(1)


def milliseconds(work, runs=9, repeats=50):
    times = []
    for _ in range(runs + 1):
        start = time.perf_counter()
        for _ in range(repeats):
            work()
        times.append((time.perf_counter() - start) / repeats * 1e3)
    return sorted(times[1:])[runs // 2]


def timed(width):
    net = torch.nn.Sequential(
        torch.nn.Linear(inputs, width),
        torch.nn.LeakyReLU(0.3),
        torch.nn.Linear(width, width),
        torch.nn.LeakyReLU(0.3),
        torch.nn.Linear(width, 1),
    )
    adam = torch.optim.Adam(net.parameters(), lr=1e-3)
    x = torch.randn(batch, inputs)
    y = torch.randn(batch, 1)

    def step():
        adam.zero_grad()
        ((net(x) - y) ** 2).mean().backward()
        adam.step()

    def gradient():
        rows = x.clone().requires_grad_(True)
        return torch.autograd.grad(net(rows).sum(), rows)

    return [milliseconds(step), milliseconds(gradient)]


print(json.dumps([timed(width) for width in widths]))
