"""Writes test/checks/randomNumbers.json: numbers of Python's own `random` module, which runs MT19937.

Run: python3 test/oracles/random_numbers.py
"""

import json
import pathlib
import random

SEEDS = [0, 1, 20240229, 2**32 + 7, 2**53 - 1]


def stream(seed):
    words = random.Random(seed)
    uniform = random.Random(seed)
    normal = random.Random(seed)
    whole = random.Random(seed)
    return {
        "seed": seed,
        "words": [words.getrandbits(32) for _ in range(700)][-5:],
        "uniform": [uniform.random() for _ in range(400)][-5:],
        "normal": [normal.normalvariate(0, 1) for _ in range(400)][-5:],
        "below": [1, 2, 6, 1000, 2**31, 2**32 - 1],
        "integer": [whole.randrange(n) for n in [1, 2, 6, 1000, 2**31, 2**32 - 1]],
    }


out = {
    "source": "CPython 3 standard library, module random (MT19937); last 5 of 700 words, 400 uniform, 400 normal numbers",
    "streams": [stream(seed) for seed in SEEDS],
}
path = pathlib.Path(__file__).parent.parent / "checks" / "randomNumbers.json"
path.write_text(json.dumps(out, indent=2) + "\n")
