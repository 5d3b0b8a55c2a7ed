"""Lines of a station's endurance limit: every Marin factor with its own formula."""

from collections.abc import Iterator

from shaftcore import strength_factors as marin
from shaftcore.calculation_lines import Line, given, line
from shaftcore.results import Results
from shaftcore.surface import FINISHES


def strength_lines(results: Results, i: int) -> Iterator[Line]:
    """Se', the factors ka to kf, and Se."""
    strength, shaft = results.judged.strength, results.shaft
    yield _plain_line(shaft.material.tensile_strength)
    yield _finish_line(results, i)
    yield from _size_lines(results, i)
    yield given(
        "k_c",
        "Load factor",
        strength.kc,
        "ratio",
        "shigley",
        "the equivalent stress carries the sort of load",
        formula="1",
    )
    yield from _temperature_lines(shaft.duty.temperature, strength.kd)
    yield from _reliability_lines(shaft.judgement.reliability, strength.ke)
    reason = shaft.judgement.user_factor_reason
    yield given("k_f", "Own factor", strength.kf, "ratio", "judgement", reason)
    yield line(
        "S_e", "Endurance limit", "k_a k_b k_c k_d k_e k_f S_e'", "{ka} × {kb} × {kc} × {kd} × {ke} × {kf} × {plain}",
        float(strength.endurance[i]), "stress", "marin", ka=strength.ka[i], kb=strength.kb[i], kc=strength.kc,
        kd=strength.kd, ke=strength.ke, kf=strength.kf, plain=strength.plain,
    )  # fmt: skip


def _plain_line(tensile: float) -> Line:
    plain = marin.plain_endurance(tensile)
    capped = plain < marin.PLAIN_SHARE * tensile
    numbers = "{plain}" if capped else "{share} × {tensile}"
    return line(
        "S_e'", "Endurance limit of the polished specimen", "0.5 S_ut, at most 700 MPa", numbers, plain, "stress",
        "shigley", "at its bound" if capped else "", plain=plain, share=marin.PLAIN_SHARE, tensile=tensile,
    )  # fmt: skip


def _finish_line(results: Results, i: int) -> Line:
    table, tensile = results.shaft.judgement.finish_table, results.shaft.material.tensile_strength
    name, words = FINISHES[int(results.judged.finish[i])]
    factor, power = marin.FINISH_TABLES[table][name]
    ka = float(results.judged.strength.ka[i])
    capped = factor * tensile**power > ka
    flags = [f"{words}, {table} table"] + ["not above 1"] * capped
    return line(
        "k_a", "Finish factor", "a S_ut^b, at most 1", "1" if capped else "{a} × {tensile}^{b}", ka, "ratio", "marin",
        "; ".join(flags), a=factor, b=power, tensile=tensile,
    )  # fmt: skip


def _size_lines(results: Results, i: int) -> Iterator[Line]:
    strength, d = results.judged.strength, float(results.judged.d[i])
    size, kb = float(strength.size_diameter[i]), float(strength.kb[i])
    symbol = "d"
    if size != d:
        symbol = "d_e"
        yield line(
            symbol, "Diameter for the size factor", "0.37 d", "{share} × {d}", size, "length", "marin",
            "the shaft stands still under its load", share=marin.STANDING_SHARE, d=d,
        )  # fmt: skip
    factor, power = marin.SIZE_SMALL if size <= marin.SIZE_SWITCH else marin.SIZE_LARGE
    raw = factor * size**power
    if kb == 1.0:
        flag = "axial load alone" if raw < 1 else "not above 1"
        yield line("k_b", "Size factor", "1", "1", kb, "ratio", "marin", flag)
        return
    flag = "above 254 mm: the power is carried on" if size > marin.SIZE_HIGH else ""
    yield line(
        "k_b", "Size factor", f"{factor:g} {symbol}^{power:g}".replace("-", "−"), "{factor} × {size}^{power}", kb,
        "ratio", "marin", flag, factor=factor, power=power, size=size,
    )  # fmt: skip


def _temperature_lines(celsius: float, kd: float) -> Iterator[Line]:
    fahrenheit = min(marin.in_fahrenheit(celsius), marin.TEMPERATURE_HIGH_F)
    if fahrenheit < marin.TEMPERATURE_LOW_F:
        yield line("k_d", "Temperature factor", "1 below 70 °F", "1", kd, "ratio", "marin")
        return
    yield line(
        "ϑ_F", "Service temperature in °F", "°C × 9/5 + 32", "{c} × 9/5 + 32", fahrenheit, "", "given", c=celsius
    )
    c0, c1, c2, c3, c4 = marin.TEMPERATURE_FIT
    yield line(
        "k_d", "Temperature factor", "c0 + c1 ϑ_F + c2 ϑ_F² + c3 ϑ_F³ + c4 ϑ_F⁴",
        "{c0} + {c1} × {t} + {c2} × {t}^2 + {c3} × {t}^3 + {c4} × {t}^4", kd, "ratio", "marin",
        c0=c0, c1=c1, c2=c2, c3=c3, c4=c4, t=fahrenheit,
    )  # fmt: skip


def _reliability_lines(reliability: float, ke: float) -> Iterator[Line]:
    z = marin.reliability_quantile(reliability)
    yield given("z", f"Normal quantile of R = {reliability:.6g}", z, "", "practice", formula="z(R)")
    yield line(
        "k_e", "Reliability factor", "1 − 0.08 z", "1 − {spread} × {z}", ke, "ratio", "marin",
        spread=marin.RELIABILITY_SPREAD, z=z,
    )  # fmt: skip
