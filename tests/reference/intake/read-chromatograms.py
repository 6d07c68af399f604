"""Reads the fixtures' chromatograms with scipy's netCDF reader and writes what a reader must find: names, areas and times of the peaks, as doubles.

    python3 tests/reference/intake/read-chromatograms.py > tests/reference/intake/chromatograms.json
"""

import json
import pathlib

from scipy.io import netcdf_file

FILES = pathlib.Path(__file__).resolve().parents[2] / "fixtures/chromatograms"


def one(path):
    with netcdf_file(path, "r", mmap=False) as file:
        names = [b"".join(row).split(b"\0")[0].decode("ascii").strip() for row in file.variables["peak_name"].data]
        stamp = file.injection_date_time_stamp.decode("ascii")
        return {
            "stamp": f"{stamp[:4]}-{stamp[4:6]}-{stamp[6:8]}T{stamp[8:10]}:{stamp[10:12]}:{stamp[12:14]}{stamp[14:17]}:{stamp[17:]}",
            "peaks": [
                [name, float(area), float(time)]
                for name, area, time in zip(
                    names, file.variables["peak_area"].data, file.variables["peak_retention_time"].data, strict=True
                )
            ],
        }


print(json.dumps({path.name: one(path) for path in sorted(FILES.glob("*.cdf"))}, indent=1))
