"""calcpack: calculations for reinforced concrete, typeset line by line and traceable to their sources."""
