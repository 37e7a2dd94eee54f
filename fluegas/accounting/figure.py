"""What a declared figure consists of, and the groups of figures."""

from collections.abc import Callable
from dataclasses import dataclass

from fluegas.accounting.terms import Terms
from fluegas.thermo.polynomials import FloatArray

MIXTURE, HEAT_ACCOUNT, BESIDE, LIMITS, EMISSIONS = (
    "mixture",
    "heat account",
    "beside the account",
    "limits",
    "emissions",
)


@dataclass(frozen=True)
class Figure:
    """One figure: `dimension` is a name of the units floor, `when_rich` true where it stands though fuel-rich."""

    name: str
    label: str
    dimension: str
    group: str
    help: str
    source: str
    formula: Callable[[Terms], FloatArray]
    when_rich: bool = False
