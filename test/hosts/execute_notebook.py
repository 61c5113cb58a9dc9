"""Executes a notebook by nbclient and writes it: execute_notebook.py IN OUT."""
import sys

import nbformat
from nbclient import NotebookClient

source, target = sys.argv[1:]
notebook = nbformat.read(source, as_version=4)
NotebookClient(notebook, timeout=120, kernel_name="halfperiod").execute()
nbformat.validate(notebook)
nbformat.write(notebook, target)
