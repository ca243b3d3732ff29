"""The pages: thin views, forms by noun. They read what others wrote and hold no rules."""
