"""The chart room: plain data in, SVG text out; one module per drawing."""
