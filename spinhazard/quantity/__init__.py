"""Text to number and back: stated values, our notation, allow-listed units, display."""
