"""Frozen shapes handed from room to room; no files, no clock, no arithmetic of the trade."""
