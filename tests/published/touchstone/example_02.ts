[Version] 2.0
! Z parameters of a one-port, in ohms
# MHz Z MA
[Number of Ports] 1
[Number of Frequencies] 5
[Network Data]
1 11 10
2 12 20
3 13 30
4 14 40
5 15 50
[End]
