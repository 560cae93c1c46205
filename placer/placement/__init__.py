"""The placement: an integer program over volumes and pools, solved goal by goal."""
