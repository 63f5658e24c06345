"""A drag is one edit, also where the page's message that it is over overtakes its last place."""

import polywalk as pw


def test_the_end_of_a_drag_may_overtake_its_last_place():
    explorer = pw.explore(pw.scenarios.harbour_row())
    state = explorer.state
    state.number = ("right-hand side", "harbour main")
    dial = explorer.constraints.dial
    dial.place -= 1
    last = dial.place - 2
    dial.receive({"kind": "released", "place": last})
    dial.place = last  # arrives late, and changes nothing
    assert len(state.history.drafts) == 2
    dial.place -= 1  # the next drag is an edit of its own
    assert len(state.history.drafts) == 3
    dial.receive({"kind": "released", "place": 10**6})  # a page that was redrawn meanwhile
    assert len(state.history.drafts) == 3
