"""Running a calc notebook in a fresh kernel of this Python; the same run stores the same text."""

from __future__ import annotations

import os
import re
import tempfile
from collections.abc import Callable, Mapping
from pathlib import Path
from typing import Any

from lineproof.errors import SHOWN_PREFIX, UserError
from lineproof.notebook.cells import cells_of, joined
from lineproof.notebook.light_import import without_grammars

_LANGUAGE = {"file_extension": ".py", "mimetype": "text/x-python", "name": "python"}
_KERNEL = {"display_name": "Python 3 (ipykernel)", "language": "python", "name": "python3"}
_CELL_FILE = re.compile(r"\(\d+\.py, (?=line \d+\)\Z)")
"""The name that Jupyter gives a cell in the message of a SyntaxError; it says nothing to anyone."""
_TIMINGS = ("execution", "ExecuteTime", "papermill")

Progress = Callable[[int, int], None]


def execute(
    data: Mapping[str, Any], name: str, folder: Path, progress: Progress | None = None
) -> str:
    """Run a notebook given as plain data and return the text of the executed notebook.

    It runs in ``folder``; ``progress`` is told the number of code cells done and in all. Raises
    :class:`UserError` with the cell, and what it said, at the first cell that fails.
    """
    with without_grammars():
        import nbformat  # noqa: PLC0415 - Jupyter is imported on first use only
        from nbclient.exceptions import (  # noqa: PLC0415 - as above
            CellExecutionError,
            CellTimeoutError,
            DeadKernelError,
        )

    node: Any = nbformat.from_dict  # carries no types
    notebook = node(_cleared(data))
    with tempfile.TemporaryDirectory(prefix="lineproof-") as scratch:
        log = Path(scratch) / "kernel.log"
        try:
            _run(notebook, folder, Path(scratch), log, progress)
        except CellExecutionError:
            raise UserError(failures(notebook, name)) from None
        except (CellTimeoutError, DeadKernelError, RuntimeError) as error:
            raise UserError(f"{name}: {_why_stopped(error, log)}") from None
    return _stored(notebook)


def _run(notebook: Any, folder: Path, scratch: Path, log: Path, progress: Progress | None) -> None:
    from asyncio import CancelledError  # noqa: PLC0415 - as below

    from nbclient import NotebookClient  # noqa: PLC0415 - Jupyter, on first use only

    codes = [n for n, cell in enumerate(notebook.cells) if cell.cell_type == "code"]
    done = progress or (lambda _done, _total: None)

    def tell(cell_index: int, **_: object) -> None:
        done(codes.index(cell_index) + 1, len(codes))

    class Runner(NotebookClient):
        def create_kernel_manager(self) -> Any:
            self.km = _kernel_manager(scratch)
            return self.km

    client = Runner(
        notebook,
        timeout=None,
        record_timing=False,
        resources={"metadata": {"path": str(folder)}},
        on_cell_executed=tell,
    )
    # The user's own start-up files of IPython must not change a calculation.
    with log.open("wb") as stderr:
        try:
            client.execute(env=os.environ | {"IPYTHONDIR": str(scratch)}, stderr=stderr)
        except CancelledError:  # ended by a signal while the kernel starts: no Exception
            raise KeyboardInterrupt from None
        except Exception:
            # A signal makes the client end its kernel, which it then misses in one way or another.
            if getattr(client, "_async_cleanup_kernel_future", None) is None:
                raise
            raise KeyboardInterrupt from None
        finally:
            _end(client.km)


def _end(manager: Any) -> None:
    """End a kernel that outlived its client: a signal may come between two steps of that."""
    process = getattr(getattr(manager, "provisioner", None), "process", None)
    if process is not None and process.poll() is None:
        process.kill()
        process.wait()


def _kernel_manager(scratch: Path) -> Any:
    """Return a kernel manager that starts this interpreter, whatever kernels are installed."""
    from ipykernel.kernelspec import RESOURCES, get_kernel_dict  # noqa: PLC0415 - as above
    from jupyter_client.kernelspec import KernelSpec  # noqa: PLC0415 - as above
    from jupyter_client.manager import AsyncKernelManager  # noqa: PLC0415 - as above

    class ThisPython(AsyncKernelManager):
        @property
        def kernel_spec(self) -> KernelSpec:
            return KernelSpec(resource_dir=RESOURCES, **get_kernel_dict())

    made = ThisPython(connection_file=str(scratch / "kernel.json"))
    if os.name == "posix":  # sockets in a private folder: other users of the machine cannot listen
        made.transport, made.ip = "ipc", str(scratch / "kernel")
    return made


def _why_stopped(error: Exception, log: Path) -> str:
    said = log.read_text(encoding="utf-8", errors="replace").strip().splitlines()
    reason = said[-1] if said else (str(error).strip().splitlines() or [type(error).__name__])[0]
    return f"Python stopped while running it ({reason[:200]})"


def _cleared(data: Mapping[str, Any]) -> dict[str, Any]:
    """Return a copy without outputs, counts and timings, every cell with an id."""
    cells = []
    for number, raw in enumerate(data["cells"], 1):
        kept = {k: v for k, v in raw.get("metadata", {}).items() if k not in _TIMINGS}
        cell = dict(raw) | {
            "metadata": kept,
            "id": str(raw.get("id") or f"cell-{number}"),
            "source": joined(raw["source"]),
        }
        if cell["cell_type"] == "code":
            cell |= {"outputs": [], "execution_count": None}
        cells.append(cell)
    metadata = dict(data.get("metadata", {})) | {"kernelspec": _KERNEL, "language_info": _LANGUAGE}
    return {"cells": cells, "metadata": metadata, "nbformat": 4, "nbformat_minor": 5}


def _join_streams(outputs: list[Any]) -> list[Any]:
    """Join what a cell printed, which arrives in pieces of chance; of a line rewritten, the last.

    Jupyter's own way takes the square of a line's length.
    """
    joint: dict[str, Any] = {}
    kept = []
    for output in outputs:
        first = joint.get(output["name"]) if output["output_type"] == "stream" else None
        if first is not None:
            first["text"].append(output["text"])
            continue
        if output["output_type"] == "stream":
            output["text"] = [output["text"]]
            joint[output["name"]] = output
        kept.append(output)
    for output in joint.values():
        lines = "".join(output["text"]).replace("\r\n", "\n").split("\n")
        output["text"] = "\n".join(line.rstrip("\r").rpartition("\r")[2] for line in lines)
    return kept


def _stored(notebook: Any) -> str:
    """Return the text of an executed notebook as it is saved."""
    from nbformat import v4  # noqa: PLC0415 - Jupyter, on first use only

    for cell in notebook.cells:
        if cell.cell_type == "code":
            cell.outputs = _join_streams(cell.outputs)
    notebook.metadata["kernelspec"] = dict(_KERNEL)
    # The kernel reports its exact version here, which differs from machine to machine.
    notebook.metadata["language_info"] = dict(_LANGUAGE)
    writes: Any = v4.writes  # carries no types
    text: str = writes(notebook)
    return text.rstrip("\n") + "\n"


def failures(notebook: Mapping[str, Any], name: str) -> list[str]:
    """Return what the failed cells of an executed notebook said, one sentence per fault."""
    faults: list[str] = []
    for cell in cells_of(notebook, name):
        for output in cell.outputs:
            if output["output_type"] == "error":
                faults.extend(f"{name}: {cell.name}: {fault}" for fault in _said(output))
    return faults or [f"{name}: a cell failed without saying why; run it in JupyterLab"]


def _said(output: Mapping[str, Any]) -> list[str]:
    """Tell a fault of the input, shown as such by the sheet, from any other exception."""
    lines = [str(line) for line in output.get("traceback", ())]
    if lines and all(line.startswith(SHOWN_PREFIX) for line in lines):
        return [line.removeprefix(SHOWN_PREFIX) for line in lines]
    kind, value = str(output.get("ename", "")), str(output.get("evalue", "")).strip().splitlines()
    told = ": ".join(filter(None, [kind, _CELL_FILE.sub("(", value[-1]) if value else ""]))
    # The usual cause is a line of the inputs that was deleted or misspelled.
    return [f"{told}; give it in a cell above this one" if kind == "NameError" else told]
