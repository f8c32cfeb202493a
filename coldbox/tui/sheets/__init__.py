"""What stands over a page for a while: a side sheet, a pick-list, help, a question."""
