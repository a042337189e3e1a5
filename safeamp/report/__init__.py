"""Nouns and answers -> what people and scripts read; nothing is computed or judged here."""
