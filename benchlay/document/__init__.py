"""Text to marked nodes, nodes to values: everything keeps its file, line and column.

Nothing here knows what a bench is. `nodes` turns YAML into nodes with places, `quantity`
text into numbers of one unit, `forms` nodes into values, `record` tables of keys into
objects; `problems` collects all that is wrong, so that one run reports it all.
"""
