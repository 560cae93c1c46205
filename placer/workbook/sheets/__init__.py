"""Sheets of the inventory, column by column; ``placer.workbook.columns`` joins them."""
