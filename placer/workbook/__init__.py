"""The edge to files: reads the inventory, writes the plan.  Only here is openpyxl."""
