"""What is painted: one surface of lines for all pages and sheets, and the editor of one line."""
