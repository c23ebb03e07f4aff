"""Forward models and stories from which the demo campaign is made."""

__all__: list[str] = []
