"""Forms by noun. They read what was typed; what may be done is for the actions to say."""
