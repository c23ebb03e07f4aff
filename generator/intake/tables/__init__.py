"""From bytes on disk to exact cells: files, text tables, numbers, and what is wrong with them."""
