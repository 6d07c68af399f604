"""Wall-clock times around every change of the clocks from 2019 to 2030 in six zones, with all instants they can mean, by Python's zoneinfo (PEP 615).

    python3 tests/reference/intake/local-times.py > tests/reference/intake/local-times.json
"""

import datetime as dt
import json
from zoneinfo import ZoneInfo

ZONES = ["Europe/Berlin", "America/Chicago", "Asia/Kolkata", "Australia/Lord_Howe", "America/Sao_Paulo", "Africa/Casablanca"]
UTC = dt.timezone.utc


def instants(local, zone):
    found = set()
    for fold in (0, 1):
        instant = local.replace(tzinfo=zone, fold=fold).astimezone(UTC)
        if instant.astimezone(zone).replace(tzinfo=None) == local:
            found.add(int(instant.timestamp()))
    return sorted(found)


def changes(zone):
    hour = dt.datetime(2019, 1, 1, tzinfo=UTC)
    before = hour.astimezone(zone).utcoffset()
    while hour.year < 2031:
        hour += dt.timedelta(hours=1)
        now = hour.astimezone(zone).utcoffset()
        if now != before:
            yield hour
            before = now


rows = []
for name in ZONES:
    zone = ZoneInfo(name)
    # in a zone that never changes its clocks, an ordinary day
    for change in list(changes(zone)) or [dt.datetime(2026, 3, 29, 1, tzinfo=UTC)]:
        middle = change.astimezone(zone).replace(tzinfo=None)
        for minutes in (-180, -90, -61, -60, -31, -30, -29, -1, 0, 1, 29, 30, 31, 59, 60, 61, 90, 180):
            local = middle + dt.timedelta(minutes=minutes)
            rows.append([name, int(local.replace(tzinfo=UTC).timestamp()), instants(local, zone)])
print("[\n" + ",\n".join(json.dumps(row) for row in rows) + "\n]")
