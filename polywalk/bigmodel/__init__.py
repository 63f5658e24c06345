"""The sparse model of many variables, in floats: what files hold and what narrowing cuts small models from."""

from polywalk.bigmodel.exchange import LARGEST_DENSE
from polywalk.bigmodel.naming import locate
from polywalk.bigmodel.sparse import BigModel

__all__ = ["LARGEST_DENSE", "BigModel", "locate"]
