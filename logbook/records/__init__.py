"""The printed, numbered record of a signed decision: reserved, issued, stored by digest."""
