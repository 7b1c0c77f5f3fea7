"""``python -m braidsearch`` is the console command ``braidsearch``."""

from braidsearch.command_line.main import run

if __name__ == "__main__":
    run()
