"""The bibliography, cited by key in docstrings, workings, sheet and manual.

Where `from_memory` is true the formula was written down from memory of that source and is checked
against a second source, a limit case or a finite-element solution in the tests.
"""

from dataclasses import dataclass


@dataclass(frozen=True)
class Source:
    """A published source: `short` fits beside a number, `full` stands in the list of sources."""

    short: str
    full: str
    from_memory: bool = True


SOURCES: dict[str, Source] = {
    "pilkey": Source("Pilkey", "W. D. Pilkey, Peterson's Stress Concentration Factors: polynomial fits to the charts"),
    "din743-2": Source("DIN 743-2", "DIN 743-2, Load capacity of shafts and axles: form numbers in closed form"),
    "shigley": Source(
        "Shigley", "R. Budynas, K. Nisbett, Shigley's Mechanical Engineering Design: shaft and fatigue chapters"
    ),
    "neuber": Source("Neuber", "H. Neuber, notch sensitivity with the constants of the Shigley textbooks"),
    "peterson": Source("Peterson", "R. E. Peterson, notch sensitivity q = 1/(1 + a/r)"),
    "cowper": Source("Cowper", "G. R. Cowper, The shear coefficient in Timoshenko's beam theory, 1966"),
    "din5418": Source("DIN 5418", "DIN 5418 and ISO 582, rolling-bearing corner dimensions and abutments"),
    "statics": Source("statics", "Equilibrium of the shaft and elementary beam theory", from_memory=False),
    "goodman": Source("Goodman", "J. Goodman, straight line between endurance limit and tensile strength"),
    "gerber": Source("Gerber", "W. Gerber, parabola between endurance limit and tensile strength"),
    "marin": Source("Marin", "J. Marin, factors on the endurance limit, with the constants of the Shigley textbooks"),
    "given": Source("given", "The shaft as described by its author", from_memory=False),
    "judgement": Source("judgement", "The judgement chosen for this shaft", from_memory=False),
    "fe": Source(
        "finite elements",
        "Converged axisymmetric finite-element solutions of shoulders and grooves, Poisson's ratio 0.3",
        from_memory=False,
    ),
    "practice": Source("common practice", "Common practice of the trade, no source", from_memory=False),
}
