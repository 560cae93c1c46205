"""From files to records: raw cells, headings, values, then one module per sheet."""
