#!/usr/bin/python3
# Doubles and what '%.7g' makes of them, as exact hexadecimal floats, for seven_digits_test.cpp.
# Run: ./make_seven_digits.py > seven_digits.csv
import random
import struct

rng = random.Random(71077345)
values = [0.1, 0.3, 1e22, 1e-300, 5e-324, 1.7976931348623157e308, 9999999.5, 999999.95, 0.99999995, 0.5, 1 / 3,
          1234567.5, 1234568.5, 2097152.5, 2.5e-7, 9.9999995, 99.999995, 1e6, 1e7, 1e-6, 9.99999949999]
for _ in range(300):
    values.append(rng.uniform(-1000, 1000))
for _ in range(150):
    values.append(rng.uniform(1, 10) * 10 ** rng.randint(-12, 14))
for _ in range(100):  # next to a tie
    values.append(float(f"{rng.randint(1000000, 9999999)}5e{rng.randint(-9, 2)}"))
for _ in range(60):  # any bits at all
    value = struct.unpack("<d", rng.randbytes(8))[0]
    if value == value and abs(value) != float("inf"):
        values.append(value)
print("value,rounded")
for value in values:
    rounded = float("%.7g" % value) + 0.0
    print(f"{value.hex()},{rounded.hex()}")
