"""Files in and packages out: design files, schedules, the PDF package, the command line."""
