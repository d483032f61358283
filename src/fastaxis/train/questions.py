"""What can be asked of a train. Rooms built on top of trains give the answers, loaded when first asked."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
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
        """Power [W] at a camera or leaving a port."""
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
        """Camera frames for many values of some parameters: {"hwp.fast": angles, "qp.retardance": values}."""
        return late("studies.sweep", "sweep")(self, values, target, settings, zipped=zipped, **options)

    def tolerance(self, errors: Mapping[Any, Any], figures_of_merit: Mapping[str, Any], **options: Any) -> Any:
        """How errors of parameters spread: sensitivities, ranked contributions, worst case, draws and yield.

        ``train.tolerance({"hwp.fast": normal(0.5*deg)}, {"leak": power_at("pbs.reflected")}, draws=10_000, seed=0)``,
        with errors and figures of merit from ``fastaxis.studies.tolerance``.
        """
        return late("studies.tolerance", "tolerance")(self, errors, figures_of_merit, **options)

    def find_fault(self, frames: Any, settings: Any, **options: Any) -> Any:
        """Which single mistake on the bench would make the frames that were recorded, ranked.

        ``train.find_fault(shots.frames, shots.settings, target="cam", noise=0.01)``, with ``target`` the camera or
        detector the frames are of (the only camera if left out) and ``noise`` the relative difference of frames, root
        mean square, that counts as none.
        """
        return late("studies.fault", "find_fault")(self, frames, settings, **options)

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
