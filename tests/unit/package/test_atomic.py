"""A file is written whole or not at all."""

from __future__ import annotations

import os
import stat
import subprocess
import sys
from pathlib import Path

import pytest

from tensionlib.errors import TensionlibError
from tensionlib.package.files import FileWriteError, atomic, write_atomic

OLD = b"the old file\n"
NEW = b"the new file, which is longer\n" * 1000


@pytest.fixture
def target(tmp_path: Path) -> Path:
    path = tmp_path / "canopy.toml"
    path.write_bytes(OLD)
    return path


def test_a_new_file_gets_its_bytes(tmp_path: Path) -> None:
    write_atomic(tmp_path / "new.toml", NEW)
    assert (tmp_path / "new.toml").read_bytes() == NEW


def test_a_new_file_gets_the_mode_of_an_ordinary_one(tmp_path: Path) -> None:
    (tmp_path / "ordinary").write_bytes(b"")
    write_atomic(tmp_path / "new.toml", NEW)
    assert _mode(tmp_path / "new.toml") == _mode(tmp_path / "ordinary")


@pytest.mark.parametrize("mode", [0o600, 0o640, 0o664, 0o755])
def test_the_mode_is_kept(target: Path, mode: int) -> None:
    target.chmod(mode)
    write_atomic(target, NEW)
    assert (target.read_bytes(), _mode(target)) == (NEW, mode)


def test_nothing_else_is_left_in_the_folder(target: Path) -> None:
    write_atomic(target, NEW)
    assert os.listdir(target.parent) == ["canopy.toml"]


@pytest.mark.parametrize("step", ["fsync", "replace", "chmod"])
@pytest.mark.parametrize(
    "error", [OSError(28, "No space left on device"), PermissionError(13, "no")]
)
def test_a_failing_step_leaves_the_old_file(
    target: Path, monkeypatch: pytest.MonkeyPatch, step: str, error: OSError
) -> None:
    def fail(*args: object, **kwargs: object) -> None:
        raise error

    monkeypatch.setattr(atomic.os, step, fail)
    with pytest.raises(FileWriteError) as caught:
        write_atomic(target, NEW)
    assert str(caught.value) == (
        f"canopy.toml: could not be written ({error.strerror}); what stood there is unchanged"
    )
    assert target.read_bytes() == OLD
    assert os.listdir(target.parent) == ["canopy.toml"]


def test_an_interruption_leaves_the_old_file_and_passes_on(
    target: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def interrupt(*args: object) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr(atomic.os, "replace", interrupt)
    with pytest.raises(KeyboardInterrupt):
        write_atomic(target, NEW)
    assert target.read_bytes() == OLD
    assert os.listdir(target.parent) == ["canopy.toml"]


def test_a_process_that_dies_in_the_middle_leaves_the_old_file(target: Path) -> None:
    dying = (
        "import os, sys\n"
        "from tensionlib.package.files import atomic\n"
        "atomic.os.replace = lambda *a: os._exit(9)\n"
        "atomic.write_atomic(sys.argv[1], b'half')\n"
    )
    ended = subprocess.run([sys.executable, "-c", dying, str(target)], check=False)
    assert ended.returncode == 9
    assert target.read_bytes() == OLD


def test_the_bytes_are_on_the_disk_before_the_name_changes(
    target: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    steps: list[str] = []
    sync, replace = os.fsync, os.replace
    monkeypatch.setattr(atomic.os, "fsync", lambda fd: (steps.append("fsync"), sync(fd)))
    monkeypatch.setattr(atomic.os, "replace", lambda a, b: (steps.append("replace"), replace(a, b)))
    write_atomic(target, NEW)
    assert steps == ["fsync", "replace", "fsync"]


def test_a_symbolic_link_stays_one(tmp_path: Path) -> None:
    (tmp_path / "shared").mkdir()
    real = tmp_path / "shared" / "real.toml"
    real.write_bytes(OLD)
    link = tmp_path / "canopy.toml"
    link.symlink_to(real)
    write_atomic(link, NEW)
    assert link.is_symlink()
    assert real.read_bytes() == NEW
    assert os.listdir(real.parent) == ["real.toml"]


def test_a_folder_that_takes_no_file_is_named(
    target: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def refuse(**kwargs: object) -> None:
        raise PermissionError(13, "Permission denied")

    monkeypatch.setattr(atomic.tempfile, "mkstemp", refuse)
    with pytest.raises(FileWriteError) as caught:
        write_atomic(target, NEW)
    assert str(caught.value) == (
        f"canopy.toml: the folder {str(target.parent)!r} takes no new file (Permission denied);"
        " nothing was written. Make the folder writable, or save elsewhere"
    )
    assert target.read_bytes() == OLD


@pytest.mark.skipif(os.name != "posix", reason="modes of a folder are not kept elsewhere")
def test_a_read_only_folder_is_named(target: Path) -> None:
    if os.geteuid() == 0:
        # No mode holds the superuser back, so an ordinary user's process tries.
        target.parent.chmod(0o555)
        code = (
            "import os, sys\n"
            "from tensionlib.package.files.atomic import FileWriteError, write_atomic\n"
            "os.setgid(65534); os.setuid(65534)\n"
            "try:\n    write_atomic(sys.argv[1], b'x')\n"
            "except FileWriteError as error:\n    print(error)\n"
        )
        ended = subprocess.run(
            [sys.executable, "-c", code, str(target)], capture_output=True, text=True, check=True
        )
        message = ended.stdout
    else:
        target.parent.chmod(0o555)
        with pytest.raises(FileWriteError) as caught:
            write_atomic(target, NEW)
        message = str(caught.value)
    target.parent.chmod(0o755)
    assert "nothing was written" in message or "cannot be reached" in message
    assert target.read_bytes() == OLD


def test_a_read_only_file_is_not_replaced(target: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    target.chmod(0o444)
    monkeypatch.setattr(atomic.os, "access", lambda path, how: False)
    with pytest.raises(FileWriteError) as caught:
        write_atomic(target, NEW)
    assert str(caught.value) == (
        "canopy.toml: the file is read-only; nothing was written. Make it writable first"
    )
    assert target.read_bytes() == OLD


def test_a_folder_is_not_replaced(tmp_path: Path) -> None:
    with pytest.raises(FileWriteError, match="is not a file that can be replaced"):
        write_atomic(tmp_path, NEW)


def test_a_missing_folder_is_named(tmp_path: Path) -> None:
    with pytest.raises(FileWriteError, match="takes no new file"):
        write_atomic(tmp_path / "nowhere" / "canopy.toml", NEW)


def test_the_error_is_the_librarys_and_pythons() -> None:
    assert issubclass(FileWriteError, TensionlibError)
    assert issubclass(FileWriteError, OSError)


def _mode(path: Path) -> int:
    return stat.S_IMODE(path.stat().st_mode)
