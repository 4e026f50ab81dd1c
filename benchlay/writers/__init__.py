"""One file a format; each draws a sheet's primitives and knows nothing of benches."""
