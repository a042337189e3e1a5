"""Whole reports as they were once read and found right, word by word."""
