"""Questions that go wrong in a worker; a module of its own, since a process must be able to import them."""

import os
import time

import polywalk as pw


def refuses_three(model):
    """Fails for one model of many."""
    if model.name == "model 3":
        raise pw.PolywalkError("3 is not to be had", "model 3")
    return pw.region(model)


def dies_at_three(model):
    """Takes its whole process with it, as a kernel short of memory does."""
    if model.name == "model 3":
        os._exit(9)
    return pw.region(model)


def presses_ctrl_c(model):
    """As if the user pressed Ctrl-C at the third model."""
    if model.name == "model 3":
        raise KeyboardInterrupt
    return pw.region(model)


def sleeps(model):
    """Nothing but time."""
    time.sleep(0.05)
    return model.name
