"""One function per job a person asks for: fetch, call the pure part, record. One transaction each."""
