"""What people do: one function a deed. Asks the rules, appends entries, returns what happened."""
