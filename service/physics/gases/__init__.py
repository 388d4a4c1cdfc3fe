"""The gases: one file each, all of them read here, so that a new file is a new gas."""

from importlib import import_module
from pkgutil import iter_modules

for _module in iter_modules(__path__, f"{__name__}."):
    import_module(_module.name)
