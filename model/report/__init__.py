"""Checklists, workings and curves as text, JSON and pictures."""
