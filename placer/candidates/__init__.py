"""Volume x pool: what is allowed, how much of each limit it uses, what it is worth."""
