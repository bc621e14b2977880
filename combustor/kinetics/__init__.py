"""Floor 3: stirred reactors, streams and the chain they form."""
