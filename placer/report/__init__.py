"""The plan and the findings in words and as records, for terminals and machines."""
