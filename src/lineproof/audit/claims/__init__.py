"""Claims: tables read as text, what follows from them, the verdict on each."""
