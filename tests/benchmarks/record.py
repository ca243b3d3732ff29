"""How long a record takes: ``python -m tests.benchmarks.record``. Printed, never a timed test."""

import os
import tempfile
import time


def main() -> None:
    with tempfile.TemporaryDirectory() as folder:
        os.environ["LOGBOOK_DATA"] = folder
        os.environ["DJANGO_SETTINGS_MODULE"] = "logbook.settings"
        begun = time.perf_counter()
        import django

        django.setup()
        from logbook.figures.diagram import diagram_figure
        from logbook.figures.size_usage import size_figure
        from logbook.records.render import render_record
        from tests.figures.stories import DIAGRAM, STORY
        from tests.records.contents import content

        print(f"import and set-up        {time.perf_counter() - begun:6.2f} s")
        for name in ("first (cold)", "second (warm)", "third (warm)"):
            begun = time.perf_counter()
            figures = (size_figure(STORY), diagram_figure(DIAGRAM))
            drawn = time.perf_counter()
            pdf = render_record(content(figures=figures))
            done = time.perf_counter()
            print(
                f"{name:<16} figures {drawn - begun:6.2f} s, pages {done - drawn:6.2f} s,"
                f" together {done - begun:6.2f} s, {len(pdf) / 1024:.0f} kB"
            )
        print("aim: under 2 s warm")


if __name__ == "__main__":
    main()
