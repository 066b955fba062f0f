"""Views to finished, autoescaped HTML pages with relative links; ignorant of any host."""
