"""What a person or another program is given: files, tables, pictures, the report."""
