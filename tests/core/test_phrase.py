"""Words whose quantities follow the reader's units."""

import re

import pytest
from varied_shafts import VARIED

from shaftcore.evaluation import evaluate
from shaftcore.phrase import Phrase


def test_a_phrase_is_in_si_until_a_system_is_asked_for() -> None:
    """25.4 mm is an inch by definition; 1 lbf·in is 0.1129848 N·m (NIST SP 811, B.8)."""
    phrase = Phrase("Step {:length} under {:torque}, {:angle}.", (25.4, 112.9848, -30.0))
    assert str(phrase) == "Step 25.4 mm under 0.1129848 N·m, −30°."
    assert phrase.written("US") == "Step 1\u00a0in under 1\u00a0lbf·in, −30°."


def test_what_was_entered_keeps_its_digits_and_what_was_computed_has_a_few() -> None:
    assert str(Phrase("{:length}", (123.456,))) == "123.456 mm"
    assert str(Phrase("{:length}", (100 / 3,))) == "33.33 mm"
    assert Phrase("{:length}", (1.5,)).written("US") == "0.05906\u00a0in"


@pytest.mark.parametrize("name", VARIED)
def test_no_notice_and_no_limit_says_a_unit_of_the_other_system(name: str) -> None:
    results = evaluate(VARIED[name])
    phrases = [notice.words for notice in results.notices] + [limit.reason for limit in results.seat_limits]
    for phrase in phrases:
        assert not re.search(r"\b(mm|MPa|N·m|N)\b", phrase.written("US")), phrase
        assert not re.search(r"\b(in|lbf|ksi)\b(?! )", str(phrase)), phrase


def test_the_shafts_above_have_quantities_to_write() -> None:
    found = {notice.key for shaft in VARIED.values() for notice in evaluate(shaft).notices if notice.words.quantities}
    assert {"bore step", "outside a fit", "no seating face"} <= found
