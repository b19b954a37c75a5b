"""What is known: a module a subject, its entry bodies, its tables, how an entry changes them."""
