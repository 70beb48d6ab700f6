"""Analysis of continuous beams: model, direct stiffness, load cases, pairs of M and V, CSV in.

Everything in N and mm, on plain data; sign convention in ``curves``. Needs numpy, so nothing that
``import lineproof`` loads may import it.
"""
