"""Where the formulas are compared with their texts: by dimension, and by argument where that is not enough."""

BY_DIMENSION = {
    "mass": (5.0, 2e4), "length": (0.5, 60.0), "area": (0.5, 800.0), "speed": (1.0, 120.0), "force": (1e2, 2e5),
    "pressure": (1e2, 1.05e5), "temperature": (230.0, 320.0), "time": (0.1, 20.0), "angle": (0.05, 1.5),
    "acceleration": (1.0, 300.0), "density": (0.05, 1.4), "number": (0.05, 8.0),
}  # fmt: skip
"""Ranges in SI by the dimension of an argument. Points at which a text has no real value are drawn anew."""
OTHERWISE = (0.1, 1e3)
"""The range of an argument whose dimension is a unit."""

BY_ARGUMENT = {
    "geopotential_height.altitude": (-500.0, 20e3),
    "geometric_altitude.height": (-500.0, 20e3),
    "standard_temperature.height": (-500.0, 20e3),
    "hydrostatic_pressure.height": (-500.0, 20e3),
    "station_pressure.height": (-500.0, 9e3),
    "station_pressure.altimeter_setting": (9e4, 1.1e5),
    "layer_mean_temperature.low": (-500.0, 15e3),
    "layer_mean_temperature.high": (15.1e3, 20e3),
}
"""Ranges by ``function.argument``, for the ones that the table above does not fit."""

ROUNDED = {
    "hydrostatic_pressure": 1e-8,
    "station_pressure": 1e-8,
    "gas_density": 1e-9,
    "density_height": 1e-7,
}
"""Relative tolerance of formulas whose text shows a constant rounded; all others meet 1e-11."""

DIMENSIONAL_NUMBERS = {
    "geopotential_height",
    "geometric_altitude",
    "standard_temperature",
    "hydrostatic_pressure",
    "station_pressure",
    "vapour_pressure",
    "gas_density",
    "density_height",
    "true_airspeed",
    "equivalent_airspeed",
    "layer_mean_temperature",
}
"""Formulas with a number in their text that carries a unit; the check of dimensions passes them over."""
