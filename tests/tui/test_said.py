"""What a curve leaves to a sign is said in words too."""

from model.report.chart import Axis, Bound, Chart, Curve, Mark
from tui.views.opening_curve import _beyond


def _chart(peak: float) -> Chart:
    curve = Curve([0.0, 1.0, 2.0], [0.0, peak, 1.0], "time rule")
    limits = (Bound(10.0, "strength/1.5"), Bound(20.0, "9 g"))
    return Chart([curve], Axis("time", "s"), Axis("force", "kN"), limits=limits, marks=(Mark(1.0, peak, "peak"),))


def test_every_limit_below_the_peak_is_named() -> None:
    assert _beyond(_chart(9.0)) == []
    assert _beyond(_chart(10.0)) == []
    assert _beyond(_chart(15.0)) == ["OVER the limit strength/1.5"]
    assert _beyond(_chart(25.0)) == ["OVER the limit strength/1.5", "OVER the limit 9 g"]
