"""A study in parts, on any executor of `concurrent.futures`: processes, threads, or a cluster."""

from __future__ import annotations

from collections.abc import Callable
from concurrent.futures import Executor
from typing import TYPE_CHECKING, Any

from tensionlib.whatif.grid import Results

if TYPE_CHECKING:
    from tensionlib.members.brief import Brief
    from tensionlib.whatif.study import Study

PARTS_PER_WORKER = 4


def _part(base: Brief, vary: dict[Any, Any]) -> Results:
    """One part of a study, in a worker."""
    from tensionlib.whatif.study import Study

    return Study(base, vary).work_out()


def work_out(study: Study, executor: Executor, told: Callable[[int], None]) -> Results:
    """Every row of a study, parted along its longest list.

    Rules of the user's own go to other processes only where they can be pickled: a function of a
    module, not of a notebook cell.
    """
    from tensionlib.whatif.study import merge

    axes = study.fields.axes
    if not axes:
        return study.work_out(told)
    along = max(range(len(axes)), key=lambda k: len(axes[k]))
    workers = getattr(executor, "_max_workers", None) or 8
    size = max(1, -(-len(axes[along]) // (workers * PARTS_PER_WORKER)))
    out = Results.empty(len(study))
    waiting = []
    for start in range(0, len(axes[along]), size):
        places = list(range(start, min(start + size, len(axes[along]))))
        vary: dict[Any, Any] = {
            axis.names: (axis.part(places) if k == along else axis).stated
            for k, axis in enumerate(axes)
        }
        vary |= study.fields.stated_rules
        waiting.append((executor.submit(_part, study.base, vary), places))
    # In their order, whichever is done first, so that the same study gives the same results.
    for future, places in waiting:
        part = future.result()
        merge(out, part, study.shape, {along: places})
        told(len(part.verdict))
    return out
