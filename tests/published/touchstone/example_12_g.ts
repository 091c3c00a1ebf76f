[Version] 2.0
! 2-port G-parameter file: the form of example 12, not its network
# kHz G MA R 1
[Number of Ports] 2
[Two-Port Data Order] 21_12
[Number of Frequencies] 1
[Network Data]
! freq magG11 angG11 magG21 angG21 magG12 angG12 magG22 angG22
2 .95 -26 3.57 157 .04 76 .66 -14
[End]
