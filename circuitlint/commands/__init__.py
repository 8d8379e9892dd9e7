"""The commands of the command line, one module each; every module has `add(commands)`."""
