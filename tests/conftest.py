"""What all tests share: the same random cases each time, so that a green run stays green.

``pytest --hypothesis-profile=search`` draws new cases instead; do that now and then, and before a release.
"""

from hypothesis import settings

settings.register_profile("repeatable", derandomize=True, deadline=None)
settings.register_profile("search", deadline=None)
settings.load_profile("repeatable")
