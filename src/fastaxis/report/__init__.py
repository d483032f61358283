"""Figures, cards and tables for people."""
