"""What can be asked of a train. Rooms built on top of trains give the answers, loaded when first asked."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import Any

from fastaxis.loader import late
from fastaxis.train.collected import state_of

__all__ = ["Questions"]


class Questions:
    """The questions of a :class:`~fastaxis.train.train.Train`: one method each, none with physics of its own."""

    def plan(self, target: str, *, grid: Any = None, engine: str = "auto") -> Any:
        """How the light at a target will be worked out; ``print(train.plan("cam"))`` explains it."""
        return late("plan", "make_plan")(self, target, grid=grid, engine=engine)

    def field(self, target: str, *, grid: Any = None, engine: str = "auto") -> Any:
        """The light at a target: a tuple of fields, one for each part of the source that does not interfere."""
        return late("engines", "propagate")(self.plan(target, grid=grid, engine=engine))

    def power(self, target: str, *, grid: Any = None, engine: str = "auto") -> float:
        """Power [W] at a camera or leaving a port: of all the light that gets there.

        ``train.expose("cam", ...).power(...)`` counts what falls on the sensor and passes the setting; light beside the
        sensor is in this one alone. ``shots.total_power`` over this is the share that the sensor catches.
        """
        return float(sum(part.power for part in self._collected(target, grid, engine)))

    def ledger(self, *, engine: str = "auto") -> Any:
        """Where all the watts go: on every edge, into parts, out of open ports, back to the laser; they add up."""
        return late("engines.power_ledger", "power_ledger")(self, engine=engine)

    def visibility(self, target: str, setting: Any = None, *, grid: Any = None, engine: str = "auto") -> Any:
        """How deep the fringes at a target are, for each pair of paths, and why: see ``print(...)``.

        Parameters
        ----------
        setting : an analyzer in front of the target; none if left out.
        """
        return late("analysis.visibility", "visibility")(self, target, setting, grid=grid, engine=engine)

    def state(self, target: str, *, grid: Any = None, engine: str = "auto") -> Any:
        """Polarization of all the light at a target together: a State, or a StateMixture where it is not pure.

        A beam whose polarization varies from place to place is partly polarized in this sense.
        """
        return state_of(self._collected(target, grid, engine), target)

    def _collected(self, target: str, grid: Any, engine: str) -> Any:
        plan = late("plan", "make_plan")(self, target, grid=grid, engine=engine, power_only=True)
        return late("engines", "propagate")(plan)

    def expose(self, target: str | Sequence[str], settings: Any, **options: Any) -> Any:
        """Camera frames, one for each analyzer setting, on one common scale; of several sensors if several are named.

        Options are ``grid``, ``engine`` and ``precision``, as in :func:`fastaxis.camera.expose`.
        """
        return late("camera.exposing", "expose")(self, target, settings, **options)

    def sweep(
        self, values: Mapping[str, Any], target: str, settings: Any, *, zipped: bool = False, **options: Any
    ) -> Any:
        """Camera frames for many values of some parameters: {"hwp.fast": angles, "qp.retardance": values}.

        Every combination of the values, or one of each at a time with ``zipped``. Options are ``grid``, ``engine`` and
        ``progress``, as in :func:`fastaxis.studies.sweep`.
        """
        return late("studies.sweep", "sweep")(self, values, target, settings, zipped=zipped, **options)

    def tolerance(
        self,
        errors: Mapping[Any, Any],
        figures_of_merit: Mapping[str, Any],
        *,
        limits: Mapping[str, tuple[float | None, float | None]] | None = None,
        draws: int = 10_000,
        seed: int = 0,
        executor: Any = None,
        checkpoint: Any = None,
        progress: Callable[[int, int], None] | None = None,
        batch: int | None = None,
        accuracy: float = 0.02,
        grid: Any = None,
        engine: str = "auto",
    ) -> Any:
        """How errors of parameters spread: sensitivities, ranked contributions, worst case, draws and yield.

        ``train.tolerance({"hwp.fast": normal(0.5*deg)}, {"leak": power_at("pbs.reflected")}, draws=10_000, seed=0)``,
        with errors and figures of merit from ``fastaxis.studies.tolerance``.

        Parameters
        ----------
        errors : {"part.parameter": normal(...)}, or uniform, triangular, worst_case; several parameters in a tuple
            with ``together(...)`` or ``correlated(...)``.
        figures_of_merit : name -> ``power_at(...)`` and the like, or any function of a train that gives a number.
        limits : name -> (lowest, highest) that is good, None for no limit; they make the yield.
        draws, seed : of the Monte Carlo.
        executor : any ``concurrent.futures.Executor``; in this thread if left out.
        checkpoint : path of an .npz file, written after each batch; a study that was stopped goes on from there.
        progress : called as progress(draws done, draws) after each batch.
        batch : draws in a batch.
        accuracy : error of a response surface that is good enough, as a share of the spread of a figure of merit; such
            a surface stands for draws in places, distances, focal lengths, the wavelength and the source, and its error
            is measured and told. 0 propagates every draw.
        grid, engine : as in ``train.expose``.
        """
        return late("studies.tolerance", "tolerance")(
            self,
            errors,
            figures_of_merit,
            limits=limits,
            draws=draws,
            seed=seed,
            executor=executor,
            checkpoint=checkpoint,
            progress=progress,
            batch=batch,
            accuracy=accuracy,
            grid=grid,
            engine=engine,
        )

    def find_fault(self, frames: Any, settings: Any, *, target: str | None = None, noise: float = 0.01) -> Any:
        """Which single mistake on the bench would make the frames that were recorded, ranked.

        ``train.find_fault(shots.frames, shots.settings, target="cam", noise=0.01)``.

        Parameters
        ----------
        frames : recorded, (settings, ny, nx); powers (settings,) of a detector. A scale common to all is free.
        settings : of the frames.
        target : camera or detector the frames are of; the only camera if left out.
        noise : relative difference of frames, root mean square, that counts as none.
        """
        return late("studies.fault", "find_fault")(self, frames, settings, target=target, noise=noise)

    def derive(self, target: str, **options: Any) -> Any:
        """The light at a target as a formula, with the letters of the train left as letters."""
        return late("engines.symbolic", "derive")(self, target, **options)

    def inspect(self) -> Any:
        """Checks before the bench is built: findings ranked by severity, laser cautions, and what was not checked."""
        return late("inspect", "inspect_train")(self)

    def set_sheet(
        self,
        *,
        mounts: Mapping[str, Any] | None = None,
        rail_start: float = 0.0,
        heights: Mapping[str, float] | float | None = None,
        settings: Any = None,
    ) -> Any:
        """What to take to the bench: dials, positions, expected powers, states and frames.

        Parameters
        ----------
        mounts : {part: Mount}, for the parts whose scale is to be read.
        rail_start : rail reading [m] at the laser's output; positions count along the beam from there.
        heights : height of the beam [m], for all parts or by name.
        settings : analyzer settings of the frames; the six states if left out.
        """
        sheet = late("inspect", "set_sheet")
        return sheet(self, mounts=mounts or {}, rail_start=rail_start, heights=heights, settings=settings)
