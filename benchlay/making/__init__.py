"""What is to be made of sheet: the flat blanks of panels and lids, their holes and folds."""
