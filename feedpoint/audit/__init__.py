"""The findings about a result: each rule is one function, in the file that is named for its evidence."""
