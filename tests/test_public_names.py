"""The public names: listed, importable, lazy, documented."""

from __future__ import annotations

import subprocess
import sys
from importlib.metadata import PackageNotFoundError, version
from importlib.resources import files

import pytest

import spanwright
from spanwright.truss import errors


def test_the_list_is_sorted_and_what_it_was() -> None:
    assert list(spanwright.__all__) == sorted(spanwright.__all__)
    assert set(spanwright.__all__) == {
        "Design",
        "DrawingError",
        "GeometryError",
        "InputError",
        "MechanismError",
        "OutputError",
        "Project",
        "SpanwrightError",
        "Truss",
        "UnheldEndError",
        "UnknownNameError",
        "__version__",
        "check_truss",
        "design_truss",
        "parse_project",
        "read_project",
        "write_all",
    }


@pytest.mark.parametrize("name", [name for name in spanwright.__all__ if not name.startswith("__")])
def test_every_name_loads_and_is_documented(name: str) -> None:
    value = getattr(spanwright, name)
    assert value.__doc__
    assert getattr(spanwright, name) is value
    assert name in dir(spanwright)


def test_every_error_is_public() -> None:
    tree = {name for name, value in vars(errors).items() if isinstance(value, type) and issubclass(value, Exception)}
    assert tree <= set(spanwright.__all__)


def test_an_unknown_name_is_an_attribute_error() -> None:
    with pytest.raises(AttributeError, match="no attribute 'beam'"):
        _ = spanwright.beam


def test_importing_the_package_loads_nothing_heavy() -> None:
    heavy = ("numpy", "pydantic", "argparse", "dataclasses")
    probe = f"import sys, spanwright; print([name for name in {heavy} if name in sys.modules])"
    run = subprocess.run([sys.executable, "-c", probe], capture_output=True, text=True, check=True)
    assert run.stdout.strip() == "[]"


def test_the_rooms_stay_importable_beside_the_names() -> None:
    # `design` is a room and a verb: the function is `design_truss`, so that loading one never hides the other.
    probe = "import spanwright; spanwright.design_truss; import spanwright.design.run as run; print(run.__name__)"
    run = subprocess.run([sys.executable, "-c", probe], capture_output=True, text=True, check=True)
    assert run.stdout.strip() == "spanwright.design.run"


def test_the_package_says_that_it_is_typed() -> None:
    assert files("spanwright").joinpath("py.typed").is_file()


def test_the_version_is_that_of_the_package() -> None:
    try:
        installed = version("spanwright")
    except PackageNotFoundError:
        pytest.skip("spanwright runs from the work tree here; the wheel in CI is installed")
    assert spanwright.__version__ == installed
