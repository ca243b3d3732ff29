"""Drawings: verdict marks, size against usage, the failure assessment diagram, the crack to scale.

Each figure is a pure function from plain numbers and words to an SVG text, and has its table of
numbers beside it. The same SVG stands in the pages (day, lamp and sun) and in the printed record.
"""
