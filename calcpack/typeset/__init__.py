"""From the lines of a formula to mathematics on a page.

handcalcs lays each line out once, from its own source, with a neutral token in every place (`layout`). The layout
is a tree; it is proved against the line by evaluation (`layout.prove`), then emitted as LaTeX, MathML, Typst, plain
text and speech (`emit`), with symbols in one row and values that link to their origin in the next (`rows`).
"""
