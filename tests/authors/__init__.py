"""What DEVELOPERS.md tells authors to do, done."""
