"""The public types hold for a caller who checks strictly."""

import os
import subprocess
import sys
from pathlib import Path

import crossbank

HERE = Path(__file__).parent


def test_a_callers_code_type_checks(tmp_path: Path) -> None:
    """The caller's file passes mypy --strict, and each line marked wrong is really refused."""
    source = Path(crossbank.__file__).parents[1]
    found = {} if source.name == "site-packages" else {"MYPYPATH": str(source)}
    done = subprocess.run(
        [
            sys.executable,
            "-m",
            "mypy",
            "--strict",
            "--config-file",
            "",
            "--cache-dir",
            str(tmp_path),
            str(HERE / "caller.py"),
        ],
        capture_output=True,
        text=True,
        check=False,
        cwd=tmp_path,
        env=os.environ | found,
    )
    assert done.returncode == 0, done.stdout + done.stderr
