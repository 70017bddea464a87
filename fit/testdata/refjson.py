"""How the reference files of this folder are written: indented JSON, each array of numbers on one line."""
import json
import pathlib
import platform
import re

import numpy
import scipy

HERE = pathlib.Path(__file__).parent


def versions(**more):
    return {"python": platform.python_version(), "numpy": numpy.__version__, "scipy": scipy.__version__, **more}


def write(name, value):
    text = json.dumps(value, indent=1, allow_nan=False)
    text = re.sub(r"\[[^\[\]{}\"]*\]", lambda m: re.sub(r"\s+", " ", m.group()).replace("[ ", "[").replace(" ]", "]"), text)
    (HERE / name).write_text(text + "\n")
