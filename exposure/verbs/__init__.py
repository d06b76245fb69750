"""The verbs of the command, ``run(arguments) -> exit code``; answers on stdout, progress on stderr."""
