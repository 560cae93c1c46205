"""Run ``python -m placer`` as the ``placer`` command."""

from placer.cli import main

main()
