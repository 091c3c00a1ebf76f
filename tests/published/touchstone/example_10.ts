[Version] 2.0
! The network of example 9, in ohms
# MHz Z MA R 75
[Number of Ports] 1
[Number of Frequencies] 5
[Network Data]
! freq magZ11 angZ11
100 74.25 -4
200 60 -22
300 53.025 -45
400 30 -62
500 0.75 -89
[End]
