"""The kit with which authors test their rules."""
