"""Executors for studies: worker processes that cannot outlive their parent, or none at all."""

from __future__ import annotations

import multiprocessing
import os
import signal
import threading
from collections.abc import Callable, Iterator
from concurrent.futures import Executor, Future, ProcessPoolExecutor
from contextlib import contextmanager
from multiprocessing.connection import Connection, wait
from typing import Any


def core_count() -> int:
    """Return how many cores this process may use."""
    if hasattr(os, "sched_getaffinity"):
        return len(os.sched_getaffinity(0))
    return os.cpu_count() or 1


class WorkerProcesses(Executor):
    """Fresh processes, one BLAS thread each, that end with this one even when it is killed.

    They are started anew rather than forked: a copy of a process with threads in it can hang,
    and a fresh one holds no open file of its parent, so that no lock outlives the parent.
    Interrupts from the keyboard reach this process alone.

    Parameters
    ----------
    workers : int
    """

    def __init__(self, workers: int) -> None:
        # read by numpy when a worker imports it
        os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
        os.environ.setdefault("OMP_NUM_THREADS", "1")
        context = multiprocessing.get_context("spawn")
        reader, self._line = context.Pipe(duplex=False)
        self._pool = ProcessPoolExecutor(
            workers, mp_context=context, initializer=_begin_worker, initargs=(reader,)
        )

    def submit(self, fn: Callable[..., Any], /, *args: Any, **kwargs: Any) -> Future[Any]:
        """Hand a task to the processes."""
        with _interrupts_held():  # a process started here keeps them held
            return self._pool.submit(fn, *args, **kwargs)

    def shutdown(self, wait: bool = True, *, cancel_futures: bool = False) -> None:
        """End the processes once they have done what they hold."""
        self._pool.shutdown(wait=wait, cancel_futures=cancel_futures)
        self._line.close()

    def stop(self) -> None:
        """End the processes now, whatever they are doing."""
        self._line.close()
        self._pool.shutdown(wait=True, cancel_futures=True)


class InThisProcess(Executor):
    """An executor that does each task at once, here: no processes, no pickling."""

    def submit(self, fn: Callable[..., Any], /, *args: Any, **kwargs: Any) -> Future[Any]:
        """Run ``fn`` and return its finished future."""
        future: Future[Any] = Future()
        try:
            future.set_result(fn(*args, **kwargs))
        except Exception as error:
            future.set_exception(error)
        return future


def _begin_worker(line: Connection) -> None:
    signal.signal(signal.SIGINT, signal.SIG_IGN)
    parent = multiprocessing.parent_process()
    ends = [line] if parent is None else [line, parent.sentinel]
    threading.Thread(target=_end_with, args=(ends,), daemon=True).start()


def _end_with(ends: list[Any]) -> None:
    wait(ends)  # for the other end to close, or the parent to die
    os._exit(1)


@contextmanager
def _interrupts_held() -> Iterator[None]:
    if not hasattr(signal, "pthread_sigmask"):
        yield
        return
    before = signal.pthread_sigmask(signal.SIG_BLOCK, {signal.SIGINT})
    try:
        yield
    finally:
        signal.pthread_sigmask(signal.SIG_SETMASK, before)
