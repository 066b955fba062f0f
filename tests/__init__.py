"""The tests; each folder mirrors a package of the program, `site` looks at the built pages in a browser."""
