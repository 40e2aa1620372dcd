"""What each shape on the sheet is: pins, links, frame, drives; with the evidence for each decision."""
