"""What is made without looking for garbage is not walked over right after it."""

from __future__ import annotations

import gc

from lineproof.record.uncollected import uncollected


def test_what_was_made_counts_as_old() -> None:
    with uncollected():
        assert not gc.isenabled()
        made = [[number] for number in range(5000)]
    assert gc.isenabled()
    assert gc.get_freeze_count() == 0
    young = {id(each) for each in gc.get_objects(generation=0)}
    assert not young & {id(each) for each in made}


def test_what_somebody_keeps_frozen_stays_so() -> None:
    gc.freeze()
    try:
        kept = gc.get_freeze_count()
        with uncollected():
            pass
        assert gc.get_freeze_count() == kept > 0
    finally:
        gc.unfreeze()
