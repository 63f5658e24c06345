"""Tests in a real browser; a package, so that its conftest.py and the one above are two modules."""
