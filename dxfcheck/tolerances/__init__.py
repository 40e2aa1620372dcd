"""Every tolerance and limit the program decides by: no other room holds one as a literal."""
