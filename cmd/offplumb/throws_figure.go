package main

func throwFigures(j *job) []drawing { return nil }
