"""What stands beside the drawing: ledger, workings, givens, the chosen thing's sizes, notices."""
