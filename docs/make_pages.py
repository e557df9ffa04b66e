"""Write the generated parts of every page: ``python -m docs.make_pages``."""

from __future__ import annotations

from docs import make_files, make_glossary, make_keys, make_methods, make_validation
from docs.blocks import write

SCRIPTS = (make_methods, make_glossary, make_files, make_keys, make_validation)

if __name__ == "__main__":
    for script in SCRIPTS:
        write(script.PAGE, script.rendered)
