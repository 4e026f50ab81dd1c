"""What an enclosure leaves open: gaps, the directions that lead through them, lines of sight.

Everything that stops light here is convex, so that its shadow, thrown from a point on a plane,
is a convex polygon: what a gap lets through is a polygon less polygons, without any sampling.
"""
