"""Opens a result file by name with xarray and prints what it finds as JSON: open_by_name.py ENGINE FILE.

NaN, which JSON has not, becomes null."""

import json
import math
import sys

import xarray



def plain(value):
    if isinstance(value, list):
        return [plain(each) for each in value]
    return None if isinstance(value, float) and math.isnan(value) else value


engine, path = sys.argv[1:]
with xarray.open_dataset(path, engine=engine) as data:
    variables = {}
    for name, variable in data.variables.items():
        text = variable.dtype.kind in "OSU"
        variables[name] = {
            "dims": list(variable.dims),
            "kind": "text" if text else str(variable.dtype),
            "units": variable.attrs.get("units"),
            "long_name": variable.attrs.get("long_name"),
            "flags": [variable.attrs[name].tolist() for name in ("flag_values", "flag_masks") if name in variable.attrs],
            "flag_meanings": variable.attrs.get("flag_meanings"),
            "value": str(variable.values[()]) if text else plain(variable.values.tolist()),
        }
    # By the names of the coordinates, as a user would ask for it.
    nearest = None
    if data.sizes.get("time", 0) > 2:
        nearest = data["electron_density"].sel(time=data["time"][2], x=3e-3, method="nearest")
    if "gas_pressure" in data.dims:
        nearest = data["static_breakdown_voltage"].sel(gas_pressure=210.0, supply_voltage_step=2.0, method="nearest")
    print(
        json.dumps(
            {
                "sizes": dict(data.sizes),
                "coords": sorted(data.coords),
                "attrs": {name: str(value) for name, value in data.attrs.items()},
                "variables": variables,
                "nearest": None if nearest is None else float(nearest),
            }
        )
    )
