"""Questions asked of forms: dark and bright angles, lobes, conditions for darkness, slopes, errors ranked."""

from fastaxis.engines.symbolic.answers.analyzer import AnalyzerAngles, Lobes, analyzer_angles, lobes
from fastaxis.engines.symbolic.answers.darkness import Branches, dark_when
from fastaxis.engines.symbolic.answers.mistakes import Mistake, ranked_mistakes
from fastaxis.engines.symbolic.answers.overlaps import charge_share, mode_share

__all__ = [
    "AnalyzerAngles", "Branches", "Lobes", "Mistake", "analyzer_angles", "charge_share", "dark_when", "lobes",
    "mode_share", "ranked_mistakes",
]  # fmt: skip
