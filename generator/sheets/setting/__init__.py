"""Type set by the sheets themselves: plain paragraphs and tables, within the PDF engine.

The engine places and breaks boxes; what most pages consist of, words in lines and rows of cells,
is set here in a fraction of the steps. Nothing here knows what the words say. Every module but
this one needs the system libraries of the engine, so it is imported only where a PDF is made.
"""
