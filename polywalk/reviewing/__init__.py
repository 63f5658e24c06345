"""From a model to findings: the modelling mistake, its proof, and the smallest change that explains it."""

__all__: list[str] = []
