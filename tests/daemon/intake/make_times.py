#!/usr/bin/python3
# Times and their milliseconds since 1970 by Python's datetime and zoneinfo, for time_text_test.cpp.
# Run: ./make_times.py > times.csv
import random
from datetime import datetime, timedelta, timezone
from zoneinfo import ZoneInfo

EPOCH = datetime(1970, 1, 1, tzinfo=timezone.utc)
rng = random.Random(20261201)


def ms(at):
    return (at - EPOCH) // timedelta(milliseconds=1)


print("pattern,zone,text,epoch_ms")
for _ in range(150):
    at = datetime(1990, 1, 2) + timedelta(milliseconds=rng.randrange(0, 200 * 365 * 86400 * 1000))
    offset = rng.choice([0, 0, 60, -300, 330, -570, 845])
    zoned = at.replace(tzinfo=timezone(timedelta(minutes=offset)))
    timespec = rng.choice(["seconds", "milliseconds", "microseconds"])
    text = zoned.isoformat(timespec=timespec)
    if timespec == "seconds":
        zoned = zoned.replace(microsecond=0)
    if offset == 0:
        text = text.replace("+00:00", "Z")
    print(f",,{text},{ms(zoned)}")
for zone in ["Europe/Berlin", "America/New_York", "Asia/Kolkata", "Australia/Sydney"]:
    for _ in range(60):
        at = datetime(1995, 1, 1) + timedelta(seconds=rng.randrange(0, 40 * 365 * 86400))
        zoned = at.replace(tzinfo=ZoneInfo(zone))
        utc = zoned.astimezone(timezone.utc)
        there_and_back = utc.astimezone(ZoneInfo(zone)).replace(tzinfo=None) == at
        if not there_and_back or zoned.replace(fold=1).utcoffset() != zoned.utcoffset():
            continue  # told twice or never: refused, and tested by hand
        pattern, form = rng.choice([("", "%Y-%m-%d %H:%M:%S"), ("%d.%m.%Y %H:%M:%S", None),
                                    ("%m/%d/%Y %H:%M", None)])
        if "%S" not in (form or pattern):
            utc = at.replace(second=0, tzinfo=ZoneInfo(zone)).astimezone(timezone.utc)
        print(f"{pattern},{zone},{at.strftime(form or pattern)},{ms(utc)}")
