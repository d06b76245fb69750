"""Power that flows into a real ground."""


def ground_loss(problem, ends) -> float:
    """Nothing flows into a perfect ground or into none. [W]"""
    return 0.0
