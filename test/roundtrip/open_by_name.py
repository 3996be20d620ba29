"""Opens a run file by name with xarray and prints what it finds as JSON: open_by_name.py ENGINE FILE."""

import json
import sys

import xarray

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
            "value": str(variable.values[()]) if text else variable.values.tolist(),
        }
    # By the names of the coordinates, as a user would ask for it.
    nearest = data["electron_density"].sel(time=data["time"][2], x=3e-3, method="nearest") if data.sizes["time"] > 2 else None
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
