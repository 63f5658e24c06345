"""The region of a model: every vertex with all its active constraints, rays, lines, edges, facets, measures."""

from polywalk.region.enumeration import region
from polywalk.region.parts import Edge, Face, Facet, Ray, Vertex, vertex_name
from polywalk.region.projection import project
from polywalk.region.results import Region
from polywalk.region.ways import Way, ways

__all__ = ["Edge", "Face", "Facet", "Ray", "Region", "Vertex", "Way", "project", "region", "vertex_name", "ways"]
