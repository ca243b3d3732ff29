"""The crew's tablet: what it gets, what it sends, its page and its labels. Holds no rules."""
