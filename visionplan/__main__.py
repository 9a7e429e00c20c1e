"""The way in: Ctrl-C is seen to before anything else is imported."""

import gc
import os
import sys


def main() -> int:
    """Run the command that the arguments name; its exit status."""
    try:
        import signal

        # An exception would not do: numpy, for one, turns a KeyboardInterrupt during its import into an ImportError.
        if signal.getsignal(signal.SIGINT) is signal.default_int_handler:
            signal.signal(signal.SIGINT, lambda *_: os._exit(130))
    except KeyboardInterrupt:
        os._exit(130)
    # A command ends before garbage is worth the search for it; the interface, which stays, turns it on again.
    gc.disable()
    # numpy would start threads that spin while they wait for matrices larger than any here.
    os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
    from visionplan.cli import run

    return run(sys.argv[1:])


if __name__ == "__main__":
    sys.exit(main())
