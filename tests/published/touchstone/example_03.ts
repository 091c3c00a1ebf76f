[Version] 2.0
! Two-port whose order of S12 and S21 the keyword states
# GHz S RI R 50
[Number of Ports] 2
[Two-Port Data Order] 12_21
[Number of Frequencies] 2
[Network Data]
1 111 0 112 0 121 0 122 0
2 211 0 212 0 221 0 222 0
[End]
