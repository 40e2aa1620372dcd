from __future__ import annotations

from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.gears.body_pool import BodyPool

FRAME = Body(strands=(0,), pins=(0,), frame=True)
CRANK = Body(strands=(1,), pins=(0, 1), frame=False)
SPOKE = Body(strands=(2,), pins=(1,), frame=False, fills=(5,))


def test_untouched_bodies_keep_their_places() -> None:
    bodies, index = BodyPool([FRAME, CRANK]).finish()
    assert bodies == (FRAME, CRANK)
    assert index == {0: 0, 1: 1}


def test_a_body_joined_to_another_is_found_there() -> None:
    pool = BodyPool([FRAME, SPOKE, CRANK])
    made = pool.add(Body(strands=(), pins=(3,), frame=False))
    pool.join(2, 1)
    bodies, index = pool.finish()
    assert bodies[1] == Body(strands=(1, 2), pins=(0, 1), frame=False, fills=(5,))
    assert index == {0: 0, 1: 1, 2: 1, made: 2}
    assert pool.pinned_at(1) == [2]
    assert pool.body_of[2] == 2


def test_a_frame_is_made_when_it_is_given_something() -> None:
    pool = BodyPool([CRANK])
    pool.give(pool.frame, pins=(4,), wheels=(9,))
    pool.give(pool.frame, strands=(7,))
    bodies, index = pool.finish()
    assert bodies == (Body(strands=(7,), pins=(4,), frame=True, wheels=(9,)), CRANK)
    assert index[0] == 1


def test_only_moving_bodies_are_pinned() -> None:
    assert BodyPool([FRAME, CRANK]).pinned_at(0) == [1]
