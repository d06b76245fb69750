"""The keys of a site file, and how its tables are read by them.

A key is described once: the names under which it may be written (the unit is part of the name), what
its value must be, its range, its default, and a line of help.  Reading a table gives its values in SI
units and every problem in it, in the operator's words.
"""
