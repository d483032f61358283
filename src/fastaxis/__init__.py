"""fastaxis."""
