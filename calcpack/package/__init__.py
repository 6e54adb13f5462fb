"""The stages from a job folder to a package, each small: run, collect, gate, assemble, typeset, write, trace."""
