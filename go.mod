module fellreach

go 1.26
