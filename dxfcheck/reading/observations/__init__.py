"""What looks wrong on the sheet, for the rules to weigh."""
