"""``exposure report RESULT``: the PDF made again from the result file alone."""

from pathlib import Path

from exposure.outputs.report import write_report
from exposure.outputs.result_file import read_result


def run(arguments) -> int:
    """Write the report; print where."""
    result = Path(arguments.result)
    target = Path(arguments.output) if arguments.output else result.with_name("report.pdf")
    write_report(read_result(result), target)
    print(target)
    return 0
