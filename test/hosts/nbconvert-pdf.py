# Settings of nbconvert: the figures of a notebook become PDF by librsvg's program, which is small, and not by a drawing
# program with a window.
c = get_config()  # noqa: F821
c.SVG2PDFPreprocessor.command = ["rsvg-convert", "--format=pdf", "--output={to_filename}", "{from_filename}"]
c.SVG2PDFPreprocessor.inkscape_version = "1.0"
